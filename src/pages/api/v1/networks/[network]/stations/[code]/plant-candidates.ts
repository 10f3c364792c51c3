import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { MOST_CANDIDATE_DAYS, newPlantFindingSchema } from '#lib/contracts/plantCandidates';
import { valueOf } from '#lib/http/outcome';
import { parsePeriod, readJson } from '#lib/http/parse';
import { badRequest } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { plantCandidates } from '#lib/services/plants/candidates';
import { decideOnPlant } from '#lib/services/plants/decide';

const nowSec = () => Math.floor(Date.now() / 1000);

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const period = parsePeriod(context.url);
  if (period.toSec - period.fromSec > MOST_CANDIDATE_DAYS * 86_400) {
    throw badRequest(`The period may be ${MOST_CANDIDATE_DAYS} days at most.`);
  }
  return json(await plantCandidates(station, period, nowSec()));
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const input = await readJson(context.request, newPlantFindingSchema);
  const by = { userId: user.id, nowSec: nowSec() };
  return json({ finding: valueOf(await decideOnPlant(station, input, by)) }, { status: 201 });
});
