import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { summaryPreferencesSchema } from '#lib/contracts/summaryDesk';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { chooseTold, isTold } from '#lib/services/summaries/desk/readers';

export const GET = route(async (context) => {
  const { network, user, roles } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const reader = { networkId: network.id, userId: user.id };
  return json({ isTold: await isTold(reader, roles.includes('regulator')) });
});

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const preferences = await readJson(context.request, summaryPreferencesSchema);
  await chooseTold({ networkId: network.id, userId: user.id }, preferences.isTold);
  return json(preferences);
});
