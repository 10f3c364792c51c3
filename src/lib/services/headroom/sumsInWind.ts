import type { Connection } from '#db/queries/connection';
import { selectMeasuredIntervals } from '#db/queries/measuredIntervals';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import type { PeriodSums } from '#lib/acoustics/periodSums';
import { mergeWind, noWind, type WindowWind } from '#lib/acoustics/windRule';
import { accumulate } from '#lib/services/levels/accumulate';
import { judgementOf, MOST_INTERVALS, type LevelSource } from '#lib/services/levels/intervalSums';
import type { Span } from '#lib/services/levels/spans';
import { windOfSpan } from '#lib/services/limits/grains';

/** What was measured in a stretch of time, and the wind meanwhile. */
export interface SumsInWind {
  sums: PeriodSums;
  /** Of all that was measured, whether it counts or not; null of a source that does not go by the wind. */
  wind: WindowWind | null;
}

/** Sums of a stretch straight from its intervals, of a source that goes by the wind, with the wind of all that was measured. */
export async function sumsInWind(source: LevelSource, span: Span, conn: Connection): Promise<SumsInWind> {
  const whole = new PeriodAccumulator();
  const wind = noWind();
  const stepSec = MOST_INTERVALS * source.station.intervalSec;
  for (let { fromSec } = span; fromSec < span.toSec; fromSec += stepSec) {
    const part = { fromSec, toSec: Math.min(fromSec + stepSec, span.toSec) };
    const judgement = await judgementOf(source, part, conn);
    const intervals = await selectMeasuredIntervals(source.station.id, part.fromSec, part.toSec, conn);
    whole.merge(accumulate(intervals, part, judgement, { bandClasses: false }));
    mergeWind(wind, windOfSpan(intervals, part, judgement) ?? noWind());
  }
  return { sums: whole.sums, wind };
}
