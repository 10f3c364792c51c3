import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { newStationGroupSchema } from '#lib/contracts/stationGroups';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { addStationGroup } from '#lib/services/stationGroups/change';
import { readStationGroups } from '#lib/services/stationGroups/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json({ items: await readStationGroups(network.id), next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const input = await readJson(context.request, newStationGroupSchema);
  const actor = { networkId: network.id, userId: user.id };
  return json({ group: valueOf(await addStationGroup(actor, input)) }, { status: 201 });
});
