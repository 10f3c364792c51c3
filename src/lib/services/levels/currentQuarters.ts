import { type Connection } from '#db/queries/connection';
import { selectMeasuredIntervals } from '#db/queries/measuredIntervals';
import { selectQuarterHours, type QuarterHour } from '#db/queries/quarterHours';
import { QUARTER_SEC } from '#lib/time/quarters';
import { dirtySpans } from './dirtySpans';
import { judgementOf, type LevelSource } from './intervalSums';
import { quarterOf } from './quarterOf';
import { overlapsAny, type Span } from './spans';

/**
 * Quarter-hours that begin in `fromSec <= t < toSec` (whole quarter-hours), ascending and current: those that wait for
 * recomputation are made from their intervals.
 */
export async function currentQuarters(
  source: LevelSource,
  { fromSec, toSec }: Span,
  options: { bands: boolean },
  conn: Connection,
): Promise<QuarterHour[]> {
  const { id } = source.station;
  const dirty = await dirtySpans(id, { fromSec, toSec }, conn);
  const rows = await selectQuarterHours(id, fromSec, toSec, options, conn);
  if (dirty.length === 0) return rows;
  const quarters = rows.filter(({ startSec }) => !overlapsAny(dirty, startSec, startSec + QUARTER_SEC));
  for (const span of dirty) quarters.push(...(await quartersOfIntervals(source, span, conn)));
  return quarters.sort((a, b) => a.startSec - b.startSec);
}

/** Quarter-hours of a span straight from its intervals. */
export async function quartersOfIntervals(
  source: LevelSource,
  span: Span,
  conn: Connection,
): Promise<QuarterHour[]> {
  const found: QuarterHour[] = [];
  // A long backlog is read a day at a time.
  for (let fromSec = span.fromSec; fromSec < span.toSec; fromSec += 96 * QUARTER_SEC) {
    const part = { fromSec, toSec: Math.min(fromSec + 96 * QUARTER_SEC, span.toSec) };
    const judgement = await judgementOf(source, part, conn);
    const intervals = await selectMeasuredIntervals(source.station.id, part.fromSec, part.toSec, conn);
    for (let startSec = part.fromSec; startSec < part.toSec; startSec += QUARTER_SEC) {
      const quarter = quarterOf(intervals, startSec, judgement);
      if (quarter) found.push(quarter);
    }
  }
  return found;
}
