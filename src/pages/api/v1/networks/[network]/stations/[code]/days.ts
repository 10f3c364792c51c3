import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { type Days } from '#lib/contracts/levels';
import { asOfHeader } from '#lib/http/asOf';
import { parseDates } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { dayFigures } from '#lib/services/levels/days';
import { readHeavy } from '#lib/services/reading/readHeavy';

export const GET = route(async (context) => {
  const { network, settings } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const dates = parseDates(context.url);
  const { answer: days, dataAsOf } = await readHeavy(() => dayFigures({ station, ...dates }));
  const body: Days = {
    timeZone: settings.timeZone,
    minimumCoverage: settings.minimumCoverage,
    days,
  };
  return json(body, { headers: asOfHeader(dataAsOf) });
});
