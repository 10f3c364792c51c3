import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { MOST_COMPARED_DAYS } from '#lib/contracts/activities';
import { parsePeriod } from '#lib/http/parse';
import { badRequest } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { compareActivity } from '#lib/services/activities/compare';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const period = parsePeriod(context.url);
  const kind = context.url.searchParams.get('kind')?.trim();
  if (!kind) throw badRequest('`kind` is missing: give a kind of activity from the operations log.');
  if (period.toSec - period.fromSec > MOST_COMPARED_DAYS * 86_400) {
    throw badRequest(`The period may be ${MOST_COMPARED_DAYS} days at most.`);
  }
  return json(await compareActivity(station, period, kind));
});
