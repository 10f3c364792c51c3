import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { alertPreferencesSchema } from '#lib/contracts/alerts';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { ownAlertsJson } from '#lib/services/alerts/ownAlertsJson';
import { changeOwnAlerts, ownAlerts } from '#lib/services/alerts/preferences';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json(ownAlertsJson(await ownAlerts({ networkId: network.id, userId: user.id }, user.email)));
});

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const person = { networkId: network.id, userId: user.id };
  valueOf(await changeOwnAlerts(person, await readJson(context.request, alertPreferencesSchema)));
  return json(ownAlertsJson(await ownAlerts(person, user.email)));
});
