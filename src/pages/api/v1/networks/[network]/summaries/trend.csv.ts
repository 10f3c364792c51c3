import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { summaryTrend, trendCsv } from '#lib/services/summaries/desk/trend';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  return csv(trendCsv(await summaryTrend(network.id)), `${network.slug}-months.csv`);
});
