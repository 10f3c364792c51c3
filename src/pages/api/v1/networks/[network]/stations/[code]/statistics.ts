import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parseChoice, parsePeriod } from '#lib/http/parse';
import { asOfHeader } from '#lib/http/asOf';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { madeBy } from '#lib/services/calibrations/madeBy';
import { incidentOf } from '#lib/services/levels/incident';
import { periodStatistics } from '#lib/services/levels/statistics';
import { readHeavy } from '#lib/services/reading/readHeavy';
import { windSources } from '#lib/services/weather/windSources';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const period = parsePeriod(context.url);
  const validity = parseChoice(context.url, 'validity', ['rules', 'all']);
  const query = { station, ...period, validity };
  const { answer: statistics, dataAsOf } = await readHeavy(() => periodStatistics(query));
  const [incident, instruments, wind] = await Promise.all([
    incidentOf(query, statistics.LAeq),
    madeBy(station, period),
    windSources(station.id, period),
  ]);
  return json({ ...statistics, incident, instruments, wind }, { headers: asOfHeader(dataAsOf) });
});
