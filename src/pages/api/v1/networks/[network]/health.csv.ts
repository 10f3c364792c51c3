import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { healthCsv } from '#lib/services/health/csv';
import { healthNow } from '#lib/services/health/now';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const health = await healthNow(network.id, Math.floor(Date.now() / 1000));
  return csv(healthCsv(health), `${network.slug}-health.csv`);
});
