import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { makeCursor, parseCount, parseCursor } from '#lib/http/parse';
import { quarantineFilterOf } from '#lib/http/quarantineFilter';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { quarantinePage } from '#lib/services/quarantine/list';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const filter = await quarantineFilterOf(context.url, network.id);
  const limit = parseCount(context.url, 'limit', { fallback: 100, most: 1000 });
  const { items, next } = await quarantinePage(filter, limit, parseCursor(context.url));
  return json({ items, next: next && makeCursor(next) });
});
