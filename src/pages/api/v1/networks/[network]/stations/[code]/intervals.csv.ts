import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { intervalsCsvResponse } from '#lib/http/intervalsCsv';
import { parsePeriod } from '#lib/http/parse';
import { route } from '#lib/http/route';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const station = await requireStation(network.id, context.params['code']);
  return intervalsCsvResponse(station, parsePeriod(context.url));
});
