import { type Connection } from '#db/queries/connection';
import { replaceDayPeriods, type DayPeriod } from '#db/queries/dayPeriods';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { type NetworkSettings } from '#db/queries/networks';
import { replaceQuarterHours } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { accumulate, firstEndingAfter, type Judgement } from '#lib/services/levels/accumulate';
import { judgementOf } from '#lib/services/levels/intervalSums';
import { quarterOf } from '#lib/services/levels/quarterOf';
import { mergedSpans, type Span } from '#lib/services/levels/spans';
import { type PeriodInstance } from '#lib/time/periods';
import { QUARTER_SEC } from '#lib/time/quarters';
import { type Chunk } from './chunks';

/**
 * Recomputes a chunk's quarter-hours and ended periods wholly from intervals and replaces their rows. Call it with the station
 * locked, in a transaction whose reads see everything that was committed before the chunk's marks were read. A period that still
 * runs gets no row, because it would be computed again, from all its intervals, at every post: `completePeriods` sees to it later.
 */
export async function recompute(
  chunk: Chunk,
  station: Pick<StationRow, 'id' | 'intervalSec'>,
  timeline: NetworkSettings[],
  conn: Connection,
): Promise<void> {
  const ended = chunk.periods.filter(({ toSec }) => toSec <= Date.now() / 1000);
  const spans = [...ended, ...quarterSpans(chunk)];
  const span = wholeOf(spans);
  const intervals = await selectIntervals(station.id, span.fromSec, span.toSec, conn);
  const judgement = await judgementOf({ station, timeline, validity: 'rules' }, span, conn);
  const quarters = chunk.quarterStartsSec.map((startSec) => quarterOf(intervals, startSec, judgement));
  await replaceQuarterHours(
    station.id,
    chunk.quarterStartsSec,
    quarters.filter((quarter) => quarter !== null),
    conn,
  );
  const periods = ended.map((period) => periodOf(intervals, period, judgement));
  await replaceDayPeriods(
    station.id,
    mergedSpans(spans),
    periods.filter((period) => period !== null),
    conn,
  );
}

function quarterSpans({ quarterStartsSec }: Chunk): Span[] {
  return quarterStartsSec.map((fromSec) => ({ fromSec, toSec: fromSec + QUARTER_SEC }));
}

function wholeOf(spans: readonly Span[]): Span {
  return {
    fromSec: Math.min(...spans.map(({ fromSec }) => fromSec)),
    toSec: Math.max(...spans.map(({ toSec }) => toSec)),
  };
}

/** A day, evening or night wholly from intervals; null when it has none. */
function periodOf(
  intervals: readonly StoredInterval[],
  period: PeriodInstance,
  judgement: Judgement,
): DayPeriod | null {
  let flagBits = 0;
  const first = firstEndingAfter(intervals, period.fromSec);
  let end = first;
  for (; (intervals[end]?.startSec ?? Infinity) < period.toSec; end += 1)
    flagBits |= intervals[end]?.flags ?? 0;
  if (end === first) return null;
  return { ...period, flagBits, sums: accumulate(intervals, period, judgement, { bandClasses: true }).sums };
}
