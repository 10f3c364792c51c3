import { requireAdministrator, requireUser } from '#lib/auth/guards';
import { openNetworksOf } from '#lib/auth/networkAccess';
import { newNetworkSchema } from '#lib/contracts/networks';
import { readJson } from '#lib/http/parse';
import { invalidFields } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { networkNow } from '#lib/services/networks/now';
import { makeNetwork } from '#lib/services/networks/make';
import { networkView } from '#lib/services/networks/view';

export const GET = route(async (context) => {
  const networks = await openNetworksOf(requireUser(context));
  const items = await Promise.all(networks.map(({ network }) => networkNow(network)));
  return json({ items, next: null });
});

export const POST = route(async (context) => {
  const user = requireAdministrator(context);
  const input = await readJson(context.request, newNetworkSchema);
  const made = await makeNetwork(input, user.id);
  if (made.outcome === 'slug-taken') {
    throw invalidFields([{ field: 'slug', message: 'belongs to another network already' }]);
  }
  return json({ network: networkView(made.network, made.settings) }, { status: 201 });
});
