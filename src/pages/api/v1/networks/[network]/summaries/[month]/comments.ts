import { requireNetwork } from '#lib/auth/guards';
import { newCommentSchema } from '#lib/contracts/summaryLife';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthOf } from '#lib/http/summaryMonth';
import { commentOnMonth, monthComments } from '#lib/services/summaries/life/comments';

export const GET = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['operator']);
  return json({ items: await monthComments(network.id, monthOf(context.params['month']), user.id) });
});

export const POST = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['operator']);
  const month = monthOf(context.params['month']);
  const { body } = await readJson(context.request, newCommentSchema);
  valueOf(await commentOnMonth({ network, month, userId: user.id }, body));
  return json({ items: await monthComments(network.id, month, user.id) });
});
