import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { driftSource, stationDrift } from '#lib/services/drift/stationDrift';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const source = await driftSource(network.id, Math.floor(Date.now() / 1000));
  return json(await stationDrift(station, source));
});
