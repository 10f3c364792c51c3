import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { stationChangesSchema } from '#lib/contracts/stations';
import { readJson } from '#lib/http/parse';
import { invalidFields } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeStation } from '#lib/services/stations/change';
import { stationNow } from '#lib/services/stations/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  return json({ station: await stationNow(station) });
});

export const PATCH = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const change = await changeStation(station, await readJson(context.request, stationChangesSchema), user.id);
  if (change.outcome === 'refused') throw invalidFields(change.fields);
  return json({ station: await stationNow(change.station) });
});
