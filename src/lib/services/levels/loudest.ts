import { type Connection } from '#db/queries/connection';
import { selectIntervals } from '#db/queries/intervals';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { QUARTER_SEC } from '#lib/time/quarters';
import { counts, rulesSpans } from './accumulate';
import { judgementOf, type LevelSource } from './intervalSums';
import { type QuarterSeries } from './quarterSeries';
import { type Span } from './spans';

/** The loudest moment of a period. */
export interface Loudest {
  lafmaxDb: number;
  /** Start and length of the first valid interval that has it, epoch seconds. */
  startSec: number;
  durationSec: number;
}

/** The highest LAFmax within a series' quarter-hours `fromSec <= t < toSec`, and when it was; null when there is none. */
export async function loudestOf(
  source: LevelSource,
  { fromSec, toSec }: Span,
  series: QuarterSeries,
  conn: Connection,
): Promise<Loudest | null> {
  const loudest = series.loudestQuarter({ fromSec, toSec });
  if (!loudest) return null;
  const quarter = { fromSec: loudest.startSec, toSec: loudest.startSec + QUARTER_SEC };
  const judgement = await judgementOf(source, quarter, conn);
  const rules = rulesSpans(quarter.fromSec, quarter.toSec, source.timeline)[0]?.rules;
  const intervals = await selectIntervals(source.station.id, quarter.fromSec, quarter.toSec, conn);
  const interval = intervals.find(
    (candidate) =>
      candidate.lafmaxCentiDb === loudest.lafmaxCentiDb &&
      rules !== undefined &&
      counts(candidate, rules, judgement),
  );
  return (
    (interval && {
      lafmaxDb: centiDbToDb(loudest.lafmaxCentiDb),
      startSec: interval.startSec,
      durationSec: interval.durationSec,
    }) ??
    null
  );
}
