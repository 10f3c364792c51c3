import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { makeCursor, parseCount, parseCursor, parseOptionalPeriod } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { troublePage } from '#lib/services/health/now';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const code = context.url.searchParams.get('station');
  const station = code === null ? null : await requireStation(network.id, code);
  const page = await troublePage({
    networkId: network.id,
    stationId: station?.id ?? null,
    ...parseOptionalPeriod(context.url),
    limit: parseCount(context.url, 'limit', { fallback: 100, most: 1000 }),
    cursor: parseCursor(context.url),
  });
  return json({ items: page.items, next: page.next && makeCursor(page.next) });
});
