import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES, mayAct } from '#lib/auth/roles';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { monthOf } from '#lib/http/summaryMonth';
import { monthLife } from '#lib/services/summaries/life/view';

export const GET = route(async (context) => {
  const { network, user, roles } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const life = await monthLife(network.id, monthOf(context.params['month']));
  const isOperator = mayAct(user, roles, ['operator']);
  return json(isOperator ? life : { ...life, draft: life.draft && { ...life.draft, failure: null } });
});
