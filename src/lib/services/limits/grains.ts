import type { Connection } from '#db/queries/connection';
import { selectIntervals } from '#db/queries/intervals';
import type { MeasuredInterval } from '#db/queries/intervalRows';
import type { PeriodSums } from '#lib/acoustics/periodSums';
import { WINDOW_GRAIN_MIN } from '#lib/time/clockWindows';
import { addWind, noWind, type WindowWind } from '#lib/acoustics/windRule';
import { accumulate, firstEndingAfter, windOf, type Judgement } from '../levels/accumulate';
import { judgementOf, MOST_INTERVALS, type LevelSource } from '../levels/intervalSums';
import type { Span } from '../levels/spans';

/** What every window of a limit is whole numbers of. */
export const GRAIN_SEC = WINDOW_GRAIN_MIN * 60;

/** What was measured in five minutes. */
export interface GrainSums {
  startSec: number;
  sums: PeriodSums;
  /** Of a source that goes by the wind. */
  wind?: WindowWind | undefined;
}

/**
 * Sums of every five minutes of `fromSec <= t < toSec` (whole fives of minutes), ascending, straight from the intervals; those
 * without any interval are left out. An interval longer than that counts in each by its share.
 */
export async function sumsByGrain(source: LevelSource, span: Span, conn: Connection): Promise<GrainSums[]> {
  const found: GrainSums[] = [];
  const stepSec = Math.max(
    GRAIN_SEC,
    Math.floor((MOST_INTERVALS * source.station.intervalSec) / GRAIN_SEC) * GRAIN_SEC,
  );
  for (let fromSec = span.fromSec; fromSec < span.toSec; fromSec += stepSec) {
    const part = { fromSec, toSec: Math.min(fromSec + stepSec, span.toSec) };
    const judgement = await judgementOf(source, part, conn);
    const intervals = await selectIntervals(source.station.id, part.fromSec, part.toSec, conn);
    if (intervals.length === 0) continue;
    for (let startSec = part.fromSec; startSec < part.toSec; startSec += GRAIN_SEC) {
      const grain = { fromSec: startSec, toSec: startSec + GRAIN_SEC };
      const { sums } = accumulate(intervals, grain, judgement, { bandClasses: false });
      if (sums.validSec > 0 || sums.excludedSec > 0)
        found.push({ startSec, sums, wind: windOfSpan(intervals, grain, judgement) });
    }
  }
  return found;
}

/** Wind of all that was measured in a span, whether it counts or not; undefined where no rule asks for it. */
export function windOfSpan(
  intervals: readonly MeasuredInterval[],
  { fromSec, toSec }: Span,
  judgement: Judgement,
): WindowWind | undefined {
  const { wind: rule } = judgement;
  if (!rule) return undefined;
  const wind = noWind();
  for (let at = firstEndingAfter(intervals, fromSec); at < intervals.length; at += 1) {
    const interval = intervals[at];
    if (!interval || interval.startSec >= toSec) break;
    const endSec = interval.startSec + interval.durationSec;
    const seconds = Math.min(endSec, toSec) - Math.max(interval.startSec, fromSec);
    addWind(wind, rule, windOf(interval, judgement), seconds);
  }
  return wind;
}
