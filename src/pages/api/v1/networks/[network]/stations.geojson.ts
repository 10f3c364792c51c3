import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { stationsGeoJson } from '#lib/services/stations/geoJson';
import { stationsOf } from '#lib/services/stations/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json(stationsGeoJson(await stationsOf(network.id)), {
    headers: { 'Content-Type': 'application/geo+json; charset=utf-8' },
  });
});
