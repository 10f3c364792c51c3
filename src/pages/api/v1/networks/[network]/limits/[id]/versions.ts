import { requireNetwork } from '#lib/auth/guards';
import { newLimitVersionSchema } from '#lib/contracts/limits';
import { limitIdOf, limitOf } from '#lib/http/limitOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { reviseLimit } from '#lib/services/limits/set';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const limit = await readJson(context.request, newLimitVersionSchema);
  const setter = { userId: user.id, networkId: network.id };
  const outcome = await reviseLimit(setter, limitIdOf(context.params.id), limit);
  return json({ limit: limitOf(outcome) }, { status: 201 });
});
