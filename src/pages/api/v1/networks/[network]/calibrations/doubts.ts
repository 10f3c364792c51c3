import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { doubtDecisionSchema } from '#lib/contracts/calibrations';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { decideDoubt } from '#lib/services/calibrations/decide';
import { doubtJson, doubtsOf } from '#lib/services/calibrations/doubts';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json({ items: (await doubtsOf(network.id)).map(doubtJson), next: null });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const decision = await readJson(context.request, doubtDecisionSchema);
  const act = { networkId: network.id, userId: user.id };
  return json({ doubt: valueOf(await decideDoubt(act, decision)) });
});
