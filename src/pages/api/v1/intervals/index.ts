import { ShiftUnderWay } from '#ingest/receive/clockRules';
import { readEnvelope, UnreadablePost } from '#ingest/receive/envelope';
import { receiveBatch } from '#ingest/receive/receive';
import { requireStationToken } from '#lib/auth/guards';
import { Problem } from '#lib/http/problem';
import { readMonitorBody } from '#lib/http/readMonitorBody';
import { json } from '#lib/http/respond';
import { route } from '#lib/http/route';

export const POST = route(async ({ request }) => {
  const station = await requireStationToken(request);
  const text = await readMonitorBody(request);
  try {
    return json(await receiveBatch(station, readEnvelope(text, station.bandFraction), new Date()));
  } catch (error) {
    throw refusalOf(error);
  }
});

function refusalOf(error: unknown): unknown {
  if (error instanceof UnreadablePost) return problemOf(error);
  if (!(error instanceof ShiftUnderWay)) return error;
  const headers = { 'Retry-After': '20' };
  return new Problem(503, 'clock-shift-under-way', 'Not possible at the moment', error.message, { headers });
}

function problemOf({ kind, detail }: UnreadablePost): Problem {
  return kind === 'too-large'
    ? new Problem(413, 'too-large', 'Too large', detail)
    : new Problem(422, 'unreadable', 'No intervals could be read', detail);
}
