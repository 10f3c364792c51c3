import { type Connection } from '#db/queries/connection';
import { type QuarterHour } from '#db/queries/quarterHours';
import { emptySums, type PeriodSums } from '#lib/acoustics/periodSums';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { currentQuarters, quartersOfIntervals } from './currentQuarters';
import { type LevelSource } from './intervalSums';
import { mergedSpans, overlapsAny, type Span } from './spans';

/** Longest interval: an exclusion leaves out whole every interval that it overlaps. */
const LONGEST_INTERVAL_SEC = 3600;

/**
 * Quarter-hours of `fromSec <= t < toSec` (whole quarter-hours), ascending and without bands, as they would be if some spans
 * were excluded as well. Within an excluded span nothing counts, so only about its ends are intervals read.
 */
export async function assumedQuarters(
  source: LevelSource,
  period: Span,
  alsoExcluded: readonly Span[],
  conn: Connection,
): Promise<QuarterHour[]> {
  const excluded = mergedSpans(alsoExcluded);
  const edges = mergedSpans(excluded.flatMap(edgesOf)).flatMap((edge) => clipped(edge, period));
  const isIn = (spans: readonly Span[], startSec: number) =>
    overlapsAny(spans, startSec, startSec + QUARTER_SEC);
  const quarters = (await currentQuarters(source, period, { bands: false }, conn))
    .filter(({ startSec }) => !isIn(edges, startSec))
    .map((row) => (isIn(excluded, row.startSec) ? { ...row, sums: leftOut(row.sums) } : row));
  for (const edge of edges) quarters.push(...(await quartersOfIntervals(source, edge, conn)));
  return quarters.sort((a, b) => a.startSec - b.startSec);
}

/** Quarter-hours about the ends of a span whose intervals may reach over them. */
function edgesOf({ fromSec, toSec }: Span): Span[] {
  return [fromSec, toSec].map((sec) => ({
    fromSec: quarterAt(sec - LONGEST_INTERVAL_SEC),
    toSec: quarterAt(sec + LONGEST_INTERVAL_SEC + QUARTER_SEC - 1),
  }));
}

function clipped(span: Span, { fromSec, toSec }: Span): Span[] {
  const part = { fromSec: Math.max(span.fromSec, fromSec), toSec: Math.min(span.toSec, toSec) };
  return part.fromSec < part.toSec ? [part] : [];
}

function leftOut({ validSec, excludedSec }: PeriodSums): PeriodSums {
  return { ...emptySums({ bandClasses: false }), excludedSec: validSec + excludedSec };
}
