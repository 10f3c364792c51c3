import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parsePeriod } from '#lib/http/parse';
import { badRequest } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { networkLevels } from '#lib/services/map/levels';

/** A day, the longest that a clock change makes, and whole quarter-hours. */
const MOST_SEC = 26 * 3600;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const period = parsePeriod(context.url);
  if (period.toSec - period.fromSec > MOST_SEC) throw badRequest('The period may span at most 26 hours.');
  return json(await networkLevels(network.id, period));
});
