import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { calibrationsCsv } from '#lib/services/calibrations/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return csv(await calibrationsCsv(network.id), `${network.slug}-calibrations.csv`);
});
