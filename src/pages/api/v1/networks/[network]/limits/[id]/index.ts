import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES, mayAct } from '#lib/auth/roles';
import { limitIdOf, unknownLimit } from '#lib/http/limitOutcome';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { readLimit } from '#lib/services/limits/list';

export const GET = route(async (context) => {
  const { network, user, roles } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const id = limitIdOf(context.params.id);
  const found = await readLimit(network.id, id, mayAct(user, roles, ['operator']));
  if (!found) throw unknownLimit();
  return json(found);
});
