import { requireNetwork } from '#lib/auth/guards';
import { newStationGroupSchema } from '#lib/contracts/stationGroups';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json, noContent } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeStationGroup, removeStationGroup } from '#lib/services/stationGroups/change';

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newStationGroupSchema);
  const actor = { networkId: network.id, userId: user.id };
  return json({ group: valueOf(await changeStationGroup(actor, idOf(context.params.id), input)) });
});

export const DELETE = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const actor = { networkId: network.id, userId: user.id };
  valueOf(await removeStationGroup(actor, idOf(context.params.id)));
  return noContent();
});
