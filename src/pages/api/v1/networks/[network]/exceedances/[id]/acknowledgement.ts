import { requireNetwork } from '#lib/auth/guards';
import { newAcknowledgementSchema } from '#lib/contracts/exceedances';
import { exceedanceId } from '#lib/http/exceedanceFilter';
import { readJson } from '#lib/http/parse';
import { notFound, Problem } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { acknowledge, CHANGED_MEANWHILE } from '#lib/services/exceedances/acknowledge';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const given = await readJson(context.request, newAcknowledgementSchema);
  const id = exceedanceId(context.params.id);
  const outcome = await acknowledge({ networkId: network.id, id, userId: user.id, given });
  if (outcome.kind === 'unknown') throw notFound('The network has no exceedance with this number.');
  if (outcome.kind === 'changed-meanwhile') {
    throw new Problem(409, 'changed-meanwhile', 'Changed meanwhile', CHANGED_MEANWHILE);
  }
  return json({ exceedance: outcome.exceedance });
});
