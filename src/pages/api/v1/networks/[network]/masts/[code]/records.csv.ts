import { requireNetwork } from '#lib/auth/guards';
import { requireMast } from '#lib/auth/mastGuard';
import { ALL_ROLES } from '#lib/auth/roles';
import { parsePeriod } from '#lib/http/parse';
import { badRequest } from '#lib/http/problem';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { weatherCsv } from '#lib/services/weather/file';

/** About two months of minutes, the most that one file may hold. */
const LONGEST_SEC = 62 * 86_400;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const mast = await requireMast(network.id, context.params.code);
  const period = parsePeriod(context.url);
  if (period.toSec - period.fromSec > LONGEST_SEC) throw badRequest('Ask for at most 62 days at once.');
  return csv(await weatherCsv(mast.id, period), `${network.slug}-${mast.code}-weather.csv`);
});
