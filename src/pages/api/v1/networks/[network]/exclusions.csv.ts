import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parseOptionalPeriod } from '#lib/http/parse';
import { badRequest } from '#lib/http/problem';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { exclusionsCsv, MOST_CSV_EXCLUSIONS } from '#lib/services/exclusions/csv';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const code = context.url.searchParams.get('station');
  const station = code === null ? null : await requireStation(network.id, code);
  const period = parseOptionalPeriod(context.url);
  const text = await exclusionsCsv({ networkId: network.id, stationId: station?.id ?? null, ...period });
  if (text === null) {
    throw badRequest(`The list has more than ${MOST_CSV_EXCLUSIONS} exclusions; ask for a shorter period.`);
  }
  return csv(text, `${network.slug}-exclusions.csv`);
});
