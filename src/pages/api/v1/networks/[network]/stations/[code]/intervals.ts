import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { MOST_INTERVALS } from '#lib/contracts/intervals';
import { asOfHeader } from '#lib/http/asOf';
import { intervalsCsvResponse, wantsCsv } from '#lib/http/intervalsCsv';
import { makeCursor, parseCount, parseCursor, parsePeriod } from '#lib/http/parse';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { listIntervals } from '#lib/services/intervals/list';
import { readHeavy } from '#lib/services/reading/readHeavy';

const DEFAULT_LIMIT = 1000;

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params['network'], ALL_ROLES);
  const station = await requireStation(network.id, context.params['code']);
  const period = parsePeriod(context.url);
  if (wantsCsv(context.request)) return intervalsCsvResponse(station, period);
  const limit = parseCount(context.url, 'limit', { fallback: DEFAULT_LIMIT, most: MOST_INTERVALS });
  const [fromSec = period.fromSec] = parseCursor(context.url) ?? [];
  const rest = { ...period, fromSec: Math.max(fromSec, period.fromSec) };
  const { answer: page, dataAsOf } = await readHeavy(() => listIntervals(station, rest, limit));
  const next = page.nextStartSec === null ? null : makeCursor([page.nextStartSec]);
  return json({ ...page.list, next }, { headers: asOfHeader(dataAsOf) });
});
