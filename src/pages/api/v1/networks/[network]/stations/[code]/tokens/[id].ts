import { requireNetwork, requireStation } from '#lib/auth/guards';
import { notFound } from '#lib/http/problem';
import { noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { endStationToken } from '#lib/services/stations/tokens';

export const DELETE = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const id = Number(/^\d{1,10}$/.exec(context.params.id ?? '')?.[0] ?? 0);
  if (!(await endStationToken(station, id, user.id))) {
    throw notFound('The station has no token in force under this number.');
  }
  return noContent();
});
