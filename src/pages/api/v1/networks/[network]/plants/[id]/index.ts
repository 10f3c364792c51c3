import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { idOf } from '#lib/http/outcome';
import { notFound } from '#lib/http/problem';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { plantWithVersions } from '#lib/services/plants/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const found = await plantWithVersions(network.id, idOf(context.params.id));
  if (!found) throw notFound('The network has no plant with this number.');
  return json(found);
});
