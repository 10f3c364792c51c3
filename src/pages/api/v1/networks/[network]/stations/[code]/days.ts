import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { type Days } from '#lib/contracts/levels';
import { parseDates } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { dayFigures } from '#lib/services/levels/days';

export const GET = route(async (context) => {
  const { network, settings } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const dates = parseDates(context.url);
  const body: Days = {
    timeZone: settings.timeZone,
    minimumCoverage: settings.minimumCoverage,
    days: await dayFigures({ station, ...dates }),
  };
  return json(body);
});
