import { requireNetwork } from '#lib/auth/guards';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthOf } from '#lib/http/summaryMonth';
import { checksOfMonth } from '#lib/services/summaries/life/checks';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ['operator']);
  return json({ items: await checksOfMonth(network, monthOf(context.params['month'])) });
});
