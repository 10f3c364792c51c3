import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { instrumentsCsv } from '#lib/services/instruments/csv';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return csv(await instrumentsCsv(network.id), `${network.slug}-instruments.csv`);
});
