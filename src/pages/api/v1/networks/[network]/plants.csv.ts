import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { plantsCsv } from '#lib/services/plants/csv';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return csv(await plantsCsv(network.id), `${network.slug}-plants.csv`);
});
