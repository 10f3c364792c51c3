import { requireNetwork } from '#lib/auth/guards';
import { limitWithdrawalSchema } from '#lib/contracts/limits';
import { limitIdOf, limitOf } from '#lib/http/limitOutcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { endLimit } from '#lib/services/limits/set';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const { reason } = await readJson(context.request, limitWithdrawalSchema);
  const setter = { userId: user.id, networkId: network.id };
  return json({ limit: limitOf(await endLimit(setter, limitIdOf(context.params.id), reason)) });
});
