import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { type QuarterHour } from '#db/queries/quarterHours';
import { INVALIDITY_REASONS, invalidityReasons, type InvalidityReason } from '#lib/acoustics/validity';
import { QUARTER_SEC } from '#lib/time/quarters';
import {
  firstEndingAfter,
  isExcluded,
  rulesSpans,
  withWeather,
  type Judgement,
} from '../../levels/accumulate';
import { judgementOf } from '../../levels/intervalSums';
import { quarterOf } from '../../levels/quarterOf';
import { type QuarterSeries } from '../../levels/quarterSeries';
import { mergedSpans, overlapsAny, type Span } from '../../levels/spans';
import { seriesOf, type MonthEvidence } from './evidence';

/** Stretches with something left out that lie nearer are read together. */
const JOIN_SEC = 8 * QUARTER_SEC;
/** Longest stretch that is read at once. */
const AT_ONCE_SEC = 96 * QUARTER_SEC;

/** A month of everything measured, and the time left out of it by reason. */
export interface RawMonth {
  series: QuarterSeries;
  /** Seconds within the calendar month; an interval may have several reasons. */
  leftOutSec: ReadonlyMap<InvalidityReason, number>;
}

/**
 * Everything that was measured in a month. Only the quarter-hours of which something was left out are read interval by interval; of all
 * others everything counts anyway.
 */
export async function rawMonth(evidence: MonthEvidence): Promise<RawMonth> {
  const { source, quarters, conn, station, span } = evidence;
  const spans = leftOutSpans(quarters);
  const leftOutSec = new Map<InvalidityReason, number>();
  const rows = quarters.filter(({ startSec }) => !overlapsAny(spans, startSec, startSec + QUARTER_SEC));
  for (const part of parts(spans)) {
    const judgement = await judgementOf(source, part, conn);
    const intervals = await selectIntervals(station.id, part.fromSec, part.toSec, conn);
    rows.push(...rawQuarters(intervals, part, judgement));
    const counted = {
      fromSec: Math.max(part.fromSec, span.fromSec),
      toSec: Math.min(part.toSec, span.toSec),
    };
    tally(intervals, counted, judgement, leftOutSec);
  }
  const raw = { ...source, validity: 'all' } as const;
  return { series: seriesOf(raw, rows, conn), leftOutSec };
}

function leftOutSpans(quarters: readonly QuarterHour[]): Span[] {
  const touched = quarters.filter(({ sums }) => sums.excludedSec > 0);
  const wide = touched.map(({ startSec }) => ({
    fromSec: startSec,
    toSec: startSec + QUARTER_SEC + JOIN_SEC,
  }));
  return mergedSpans(wide).map(({ fromSec, toSec }) => ({ fromSec, toSec: toSec - JOIN_SEC }));
}

function parts(spans: readonly Span[]): Span[] {
  return spans.flatMap(({ fromSec, toSec }) => {
    const count = Math.ceil((toSec - fromSec) / AT_ONCE_SEC);
    return Array.from({ length: count }, (_, at) => ({
      fromSec: fromSec + at * AT_ONCE_SEC,
      toSec: Math.min(toSec, fromSec + (at + 1) * AT_ONCE_SEC),
    }));
  });
}

function rawQuarters(
  intervals: readonly StoredInterval[],
  { fromSec, toSec }: Span,
  judgement: Judgement,
): QuarterHour[] {
  const everything: Judgement = { ...judgement, validity: 'all' };
  const found: QuarterHour[] = [];
  for (let startSec = fromSec; startSec < toSec; startSec += QUARTER_SEC) {
    const quarter = quarterOf(intervals, startSec, everything);
    if (quarter) found.push(quarter);
  }
  return found;
}

function tally(
  intervals: readonly StoredInterval[],
  { fromSec, toSec }: Span,
  judgement: Judgement,
  into: Map<InvalidityReason, number>,
): void {
  if (fromSec >= toSec) return;
  for (const span of rulesSpans(fromSec, toSec, judgement.timeline)) {
    for (let at = firstEndingAfter(intervals, span.fromSec); at < intervals.length; at += 1) {
      const interval = intervals[at];
      if (!interval || interval.startSec >= span.toSec) break;
      const endSec = interval.startSec + interval.durationSec;
      const sec = Math.min(endSec, span.toSec) - Math.max(interval.startSec, span.fromSec);
      const judged = withWeather(interval, judgement);
      for (const reason of invalidityReasons(judged, span.rules, isExcluded(interval, judgement))) {
        into.set(reason, (into.get(reason) ?? 0) + sec);
      }
    }
  }
}

/** Reasons in their order with their seconds. */
export function reasonsInOrder(leftOutSec: RawMonth['leftOutSec']): [InvalidityReason, number][] {
  return INVALIDITY_REASONS.flatMap((reason) => {
    const sec = leftOutSec.get(reason);
    return sec === undefined ? [] : [[reason, sec]];
  });
}
