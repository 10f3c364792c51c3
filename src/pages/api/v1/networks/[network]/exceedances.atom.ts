import { requireFeed } from '#lib/auth/feed';
import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { config } from '#lib/config/index';
import { parseExceedanceFilter } from '#lib/http/exceedanceFilter';
import { route } from '#lib/http/route';
import { exceedancesAtom } from '#lib/services/exceedances/atom';

export const GET = route(async (context) => {
  const { network, settings } = context.locals.user
    ? await requireNetwork(context, context.params.network, ALL_ROLES)
    : await requireFeed(context.url, context.params.network, 'exceedances');
  const { origin } = config();
  const place = {
    networkId: network.id,
    networkName: network.name,
    listUrl: `${origin}/n/${network.slug}/exceedances`,
    feedUrl: `${origin}${context.url.pathname}`,
    timeZone: settings.timeZone,
  };
  const feed = await exceedancesAtom(place, await parseExceedanceFilter(context.url, network.id));
  return new Response(feed, {
    headers: { 'Content-Type': 'application/atom+xml; charset=utf-8', 'Cache-Control': 'private, no-store' },
  });
});
