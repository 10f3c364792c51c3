import { requireNetwork, requireStation } from '#lib/auth/guards';
import { newStationTokenSchema } from '#lib/contracts/stationTokens';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addStationToken, stationTokens } from '#lib/services/stations/tokens';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  return json({ items: await stationTokens(station), next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const label = await labelOf(context.request);
  return json(await addStationToken(station, user.id, label), { status: 201 });
});

/** The body came later than the route: callers without one go on as they did. */
async function labelOf(request: Request): Promise<string> {
  const isEmpty = (await request.clone().text()).trim() === '';
  if (isEmpty) return '';
  return (await readJson(request, newStationTokenSchema)).label;
}
