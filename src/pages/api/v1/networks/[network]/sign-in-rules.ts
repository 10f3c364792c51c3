import { requireAdministratorSession, requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { changeRules } from '#lib/auth/signInRules';
import { signInRulesSchema } from '#lib/contracts/secondFactor';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { signInRulesOf } from '#lib/services/networks/signInRules';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json(await signInRulesOf(network));
});

export const PUT = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const { id: userId } = requireAdministratorSession(context);
  const rules = await readJson(context.request, signInRulesSchema);
  await changeRules(network, rules, userId);
  return json(await signInRulesOf(network));
});
