import { requireNetwork } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { makeCursor, parseCount, parseCursor, parsePeriod } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { listMonths } from '#lib/services/summaries/listMonths';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const { url } = context;
  const hasPeriod = url.searchParams.has('from') || url.searchParams.has('to');
  const within = hasPeriod ? parsePeriod(url) : null;
  const limit = parseCount(url, 'limit', { fallback: 120, most: 1000 });
  const before = parseCursor(url)?.[0] ?? Infinity;
  const months = await listMonths(network, new Date(), within);
  const rest = months.filter(({ month }) => numberOf(month) < before);
  const items = rest.slice(0, limit);
  const last = items.at(-1);
  return json({ items, next: rest.length > limit && last ? makeCursor([numberOf(last.month)]) : null });
});

function numberOf(month: string): number {
  return Number(month.replace('-', ''));
}
