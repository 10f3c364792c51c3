import { requireNetwork } from '#lib/auth/guards';
import { proposalDecisionSchema } from '#lib/contracts/summaryLife';
import { idOf, valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthOf } from '#lib/http/summaryMonth';
import { decideOnProposal } from '#lib/services/summaries/life/acts';
import { monthLife } from '#lib/services/summaries/life/view';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['operator']);
  const month = monthOf(context.params['month']);
  const decision = await readJson(context.request, proposalDecisionSchema);
  valueOf(await decideOnProposal({ network, month, userId: user.id }, idOf(context.params['id']), decision));
  return json(await monthLife(network.id, month));
});
