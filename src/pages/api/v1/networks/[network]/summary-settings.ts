import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { summarySettingsSchema, type SummarySettingsAnswer } from '#lib/contracts/summarySettings';
import { valueOf } from '#lib/http/outcome';
import { readJson } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { changeSummarySettings, summarySettings } from '#lib/services/summaries/template/settings';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  return json(await answer(network.id));
});

export const PUT = route(async (context) => {
  const { network, user } = await requireNetwork(context, context.params['network'], ['operator']);
  const settings = await readJson(context.request, summarySettingsSchema);
  valueOf(await changeSummarySettings({ networkId: network.id, userId: user.id }, settings, 'keep'));
  return json(await answer(network.id));
});

async function answer(networkId: number): Promise<SummarySettingsAnswer> {
  const { graceDays, template, version, mark } = await summarySettings(networkId);
  return { graceDays, template, version, hasMark: mark !== null };
}
