import { uploadOf } from '#ingest/imports/uploads/begin';
import { giveUpUpload } from '#ingest/imports/uploads/giveUp';
import { requireNetwork } from '#lib/auth/guards';
import { importIdOf, unknownUpload } from '#lib/http/importOutcome';
import { json, noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const upload = await uploadOf(network.id, importIdOf(context.params.id));
  if (!upload) throw unknownUpload();
  return json({ upload }, { headers: { 'Upload-Offset': String(upload.offset) } });
});

export const DELETE = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const asked = { networkId: network.id, id: importIdOf(context.params.id), userId: user.id };
  if (!(await giveUpUpload(asked))) throw unknownUpload();
  return noContent();
});
