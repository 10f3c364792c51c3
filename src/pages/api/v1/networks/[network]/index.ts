import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { networkChangesSchema } from '#lib/contracts/networks';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeNetwork } from '#lib/services/networks/change';
import { networkNow } from '#lib/services/networks/now';
import { networkView } from '#lib/services/networks/view';

export const GET = route(async (context) => {
  const { network, settings } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json({ network: networkView(network, settings) });
});

export const PATCH = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const changes = await readJson(context.request, networkChangesSchema);
  return json({ network: await networkNow(await changeNetwork(network, changes, user.id)) });
});
