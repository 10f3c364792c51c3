import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES, mayAct } from '#lib/auth/roles';
import { exceedanceId } from '#lib/http/exceedanceFilter';
import { notFound } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { readExceedance } from '#lib/services/exceedances/detail';

export const GET = route(async (context) => {
  const { network, user, roles } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const exceedance = await readExceedance(exceedanceId(context.params.id), {
    networkId: network.id,
    seesRecipients: mayAct(user, roles, ['operator']),
    nowSec: Math.floor(Date.now() / 1000),
  });
  if (!exceedance) throw notFound('The network has no exceedance with this number.');
  return json({ exceedance });
});
