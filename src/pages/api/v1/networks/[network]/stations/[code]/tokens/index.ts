import { requireNetwork, requireStation } from '#lib/auth/guards';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addStationToken } from '#lib/services/stations/tokens';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  return json(await addStationToken(station, user.id), { status: 201 });
});
