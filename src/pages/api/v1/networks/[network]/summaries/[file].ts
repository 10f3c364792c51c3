import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { route } from '#lib/http/route';
import { summaryFile } from '#lib/http/summaryFile';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  return summaryFile(network, context.params['file'] ?? '', context.url.searchParams.get('revision'));
});
