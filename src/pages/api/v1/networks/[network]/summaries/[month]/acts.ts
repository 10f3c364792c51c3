import { requireNetwork } from '#lib/auth/guards';
import { monthActSchema } from '#lib/contracts/summaryLife';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthOf } from '#lib/http/summaryMonth';
import { actOnMonth } from '#lib/services/summaries/life/acts';
import { monthLife } from '#lib/services/summaries/life/view';

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['operator']);
  const month = monthOf(context.params['month']);
  const act = await readJson(context.request, monthActSchema);
  valueOf(await actOnMonth({ network, month, userId: user.id }, act));
  return json(await monthLife(network.id, month));
});
