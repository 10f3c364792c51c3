import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newStationSchema } from '#lib/contracts/stations';
import { readJson } from '#lib/http/parse';
import { invalidFields } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { stationsGeoJson } from '#lib/services/stations/geoJson';
import { stationNow, stationsOf } from '#lib/services/stations/list';
import { registerStation } from '#lib/services/stations/register';

const GEO_JSON = { 'Content-Type': 'application/geo+json; charset=utf-8', Vary: 'Accept' };

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const items = await stationsOf(network.id);
  const isGeoJson = /application\/geo\+json/i.test(context.request.headers.get('accept') ?? '');
  if (isGeoJson) return json(stationsGeoJson(items), { headers: GEO_JSON });
  return json({ items, next: null }, { headers: { Vary: 'Accept' } });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newStationSchema);
  const registration = await registerStation(network.id, input, user.id);
  if (registration.outcome === 'code-taken') {
    throw invalidFields([{ field: 'code', message: 'belongs to another station of this network' }]);
  }
  const { station, token } = registration;
  return json({ station: await stationNow(station), token }, { status: 201 });
});
