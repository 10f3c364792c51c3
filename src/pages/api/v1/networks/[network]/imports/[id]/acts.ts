import { requireNetwork } from '#lib/auth/guards';
import { importActSchema } from '#lib/contracts/imports';
import { importFrom, importIdOf } from '#lib/http/importOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { actOnImport } from '#lib/services/imports/act';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { act, reason = null } = await readJson(context.request, importActSchema);
  const asked = { networkId: network.id, id: importIdOf(context.params.id), userId: user.id };
  return json({ import: importFrom(await actOnImport({ ...asked, act, reason })) }, { status: 202 });
});
