import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES, mayAct } from '#lib/auth/roles';
import { newLimitSchema } from '#lib/contracts/limits';
import { limitOf } from '#lib/http/limitOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { listLimits } from '#lib/services/limits/list';
import { addLimit } from '#lib/services/limits/set';

export const GET = route(async (context) => {
  const { network, user, roles } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const items = await listLimits(network.id, mayAct(user, roles, ['operator']));
  return json({ items, next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const limit = await readJson(context.request, newLimitSchema);
  const outcome = await addLimit({ userId: user.id, networkId: network.id }, limit);
  return json({ limit: limitOf(outcome) }, { status: 201 });
});
