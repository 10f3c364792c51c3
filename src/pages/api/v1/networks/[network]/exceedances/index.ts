import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { parseExceedanceFilter } from '#lib/http/exceedanceFilter';
import { makeCursor, parseCount, parseCursor } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { exceedancePage } from '#lib/services/exceedances/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const { url } = context;
  const { items, next } = await exceedancePage(network.id, await parseExceedanceFilter(url, network.id), {
    limit: parseCount(url, 'limit', { fallback: 100, most: 1000 }),
    cursor: parseCursor(url),
  });
  return json({ items, next: next && makeCursor(next) });
});
