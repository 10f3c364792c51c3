import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newClockShiftSchema } from '#lib/contracts/clockShifts';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { clockShifts } from '#lib/services/clockShifts/list';
import { makeShift } from '#lib/services/clockShifts/make';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  return json({ items: await clockShifts(station.id) });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const station = await requireStation(network.id, context.params.code);
  const asked = await readJson(context.request, newClockShiftSchema);
  const shift = valueOf(await makeShift(station, asked, user.id, Math.floor(Date.now() / 1000)));
  return json({ shift }, { status: 202 });
});
