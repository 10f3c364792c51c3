import { type Connection } from '#db/queries/connection';
import { eachDayPeriod } from '#db/queries/dayPeriods';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { currentQuarters } from './currentQuarters';
import { dirtySpans } from './dirtySpans';
import { sumIntervals, type LevelSource } from './intervalSums';
import { overlapsAny, withoutSpans, type Span } from './spans';

/** The ragged nights at both ends of a month. */
const RESTS_AT_ONCE = 2;

export interface SumOptions {
  /** Also the distribution of every band. */
  bandClasses: boolean;
  /** What waits for recomputation, read before this is called; read first when left out. */
  dirty?: readonly Span[];
}

/**
 * Sums of `fromSec <= t < toSec`, current and from as few rows as possible: whole days, evenings and nights from their rows;
 * of the rest whole quarter-hours from theirs, or, where distributions per band are wanted (quarter-hours hold none), its
 * intervals; ragged ends and quarters that wait for recomputation from intervals. `validity: 'all'` is always from intervals.
 */
export async function currentSums(
  source: LevelSource,
  period: Span,
  options: SumOptions,
  conn: Connection,
): Promise<PeriodAccumulator> {
  if (source.validity === 'all') return sumIntervals(source, period, options, conn);
  const whole = new PeriodAccumulator(options);
  const { id } = source.station;
  // Marks are read before rows: what is recomputed in between is then counted anew, never missed.
  const dirty = options.dirty ?? (await dirtySpans(id, period, conn));
  const counted: Span[] = [];
  let countedToSec = -Infinity;
  for await (const rows of eachDayPeriod(id, period, options, conn)) {
    for (const { fromSec, toSec, sums } of rows) {
      // Rows may overlap where a network's zone has changed.
      if (fromSec < countedToSec || overlapsAny(dirty, fromSec, toSec)) continue;
      whole.merge({ sums });
      counted.push({ fromSec, toSec });
      countedToSec = toSec;
    }
  }
  const rests = withoutSpans(period, counted);
  const sumRest = (rest: Span) =>
    options.bandClasses ? sumIntervals(source, rest, options, conn) : sumQuarters(source, rest, conn);
  for (let first = 0; first < rests.length; first += RESTS_AT_ONCE) {
    const sums = await Promise.all(rests.slice(first, first + RESTS_AT_ONCE).map(sumRest));
    for (const part of sums) whole.merge(part);
  }
  return whole;
}

async function sumQuarters(source: LevelSource, span: Span, conn: Connection): Promise<PeriodAccumulator> {
  const whole = new PeriodAccumulator();
  const fromSec = quarterAt(span.fromSec + QUARTER_SEC - 1);
  const toSec = quarterAt(span.toSec);
  const isWhole = fromSec < toSec;
  if (isWhole) {
    const quarters = await currentQuarters(source, { fromSec, toSec }, { bands: true }, conn);
    for (const quarter of quarters) whole.merge(quarter);
  }
  for (const ragged of withoutSpans(span, isWhole ? [{ fromSec, toSec }] : [])) {
    whole.merge(await sumIntervals(source, ragged, { bandClasses: false }, conn));
  }
  return whole;
}
