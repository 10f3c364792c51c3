import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parsePeriod } from '#lib/http/parse';
import { badRequest } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { clockOffsets } from '#lib/services/clockShifts/offsets';

const LONGEST_SEC = 31 * 86_400;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const period = parsePeriod(context.url);
  if (period.toSec - period.fromSec > LONGEST_SEC) throw badRequest('The period may be 31 days at most.');
  return json(await clockOffsets(station.id, period));
});
