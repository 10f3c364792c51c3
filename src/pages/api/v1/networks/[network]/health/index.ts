import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { healthNow } from '#lib/services/health/now';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json(await healthNow(network.id, Math.floor(Date.now() / 1000)));
});
