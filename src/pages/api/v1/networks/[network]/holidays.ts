import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { holidaysSchema } from '#lib/contracts/holidays';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeHolidays, readHolidays } from '#lib/services/holidays/holidays';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json(await readHolidays(network.id));
});

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const holidays = await readJson(context.request, holidaysSchema);
  return json(await changeHolidays({ networkId: network.id, userId: user.id }, holidays));
});
