import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { healthSettingsSchema } from '#lib/contracts/health';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeHealthSettings, healthSettings } from '#lib/services/health/settings';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  return json(await healthSettings(network.id));
});

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params.network, ['operator']);
  const settings = await readJson(context.request, healthSettingsSchema);
  return json(valueOf(await changeHealthSettings(network.id, settings, user.id)));
});
