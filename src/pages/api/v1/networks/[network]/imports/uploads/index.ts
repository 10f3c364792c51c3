import { beginUpload, unfinishedUploads } from '#ingest/imports/uploads/begin';
import { requireNetwork, requireStation } from '#lib/auth/guards';
import { newUploadSchema } from '#lib/contracts/importUploads';
import { uploadProblem } from '#lib/http/importOutcome';
import { readJson } from '#lib/http/parse';
import { Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  return json({ items: await unfinishedUploads(network.id) });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const asked = await readJson(context.request, newUploadSchema);
  const station = await requireStation(network.id, asked.station);
  try {
    const outcome = await beginUpload({ networkId: network.id, station, userId: user.id }, asked);
    if (outcome.kind === 'too-many') {
      throw new Problem(409, 'too-many-uploads', 'Too many uploads', outcome.message);
    }
    const { upload } = outcome;
    const headers = { Location: `/api/v1/networks/${network.slug}/imports/uploads/${upload.id}` };
    return json({ upload }, { status: outcome.kind === 'begun' ? 201 : 200, headers });
  } catch (error) {
    throw uploadProblem(error);
  }
});
