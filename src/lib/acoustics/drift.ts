/** Days whose trimmed mean is what a place, or a self-check, is like at present. */
export const RECENT_DAYS = 10;
/** Days before those that count for neither, so that what drifts by now does not draw its own baseline along. */
const GUARD_DAYS = 14;
/** Days before those, whose trimmed mean is what it was like: eight weeks. */
const BASELINE_DAYS = 56;
/** Longest stretch over which a slope is looked for: half a year. */
export const SLOPE_DAYS = 182;

const LEAST_RECENT = 5;
const LEAST_BASELINE = 21;
const WEEK_DAYS = 7;
const LEAST_OF_WEEK = 3;
const LEAST_WEEKS = 10;
/** Left out of a mean at either end: single nights of fog, frogs or works. */
const TRIMMED_SHARE = 0.2;
/** Median absolute deviation → standard deviation of normal noise. */
const MAD_TO_DEVIATION = 1.4826;
const ERRORS_APART = 4;
/** Share by which rising pairs of weeks outnumber falling ones, or the other way round (Kendall's τ), from which on it is a slope. */
const LEAST_TAU = 0.6;

/** A value a day, ascending and without gaps in time; null where a day has none. dB. */
export type DailySeries = readonly (number | null)[];

export interface DriftVerdict {
  /** `unknown`: too few days to say. */
  state: 'fine' | 'drifting' | 'unknown';
  /** How far the last days are from the baseline, or how far the slope has led: the greater one, dB. */
  changeDb: number | null;
  /** By which it drifts; null where it does not. */
  by: 'step' | 'slope' | null;
  baselineDb: number | null;
  recentDb: number | null;
  slopeDbPerDay: number | null;
}

/** The middle of some numbers, the mean of both middles of an even count; null of none. */
export function median(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const ascending = [...values].sort((a, b) => a - b);
  const half = ascending.length / 2;
  const upper = ascending[Math.floor(half)] ?? 0;
  return Number.isInteger(half) ? ((ascending[half - 1] ?? 0) + upper) / 2 : upper;
}

/** Mean without the lowest and the highest fifth; null of none. */
export function trimmedMean(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const cut = Math.floor(values.length * TRIMMED_SHARE);
  const kept = [...values].sort((a, b) => a - b).slice(cut, values.length - cut);
  return kept.reduce((sum, value) => sum + value, 0) / kept.length;
}

/**
 * How a station's daily background differs from its neighbours': each series less its own median, then, day by day, the station's
 * value less the median of the neighbours'. What moves all alike (weather, season) cancels; one neighbour that goes astray moves
 * a median of three or more hardly. Null on days with fewer than two neighbours, for then it cannot be told which of two
 * differs. Common practice with co-located sensors; no standard defines it.
 */
export function relativeToNeighbours(
  own: DailySeries,
  neighbours: readonly DailySeries[],
): (number | null)[] {
  const centred = neighbours.map(aboutMedian);
  return aboutMedian(own).map((value, day) => {
    const others = centred.map((series) => series[day] ?? null).filter((other) => other !== null);
    const middle = others.length < 2 ? null : median(others);
    return value === null || middle === null ? null : value - middle;
  });
}

function aboutMedian(series: DailySeries): (number | null)[] {
  const middle = median(series.filter((value) => value !== null)) ?? 0;
  return series.map((value) => (value === null ? null : value - middle));
}

/**
 * Whether the last days of a series have left its baseline by more than a bound, in either of two ways. Step: the trimmed mean of the last
 * 10 days against that of 56 days before, a fortnight between them, which must also differ by four standard errors (by the median absolute deviation
 * of the baseline). Slope: Theil and Sen's slope of the weekly medians of up to half a year, times its length, where at least ten
 * weeks have one and Kendall's τ is 0.6 or more. Days before `fromDay` (an adjustment, another instrument) do not count. The bound
 * is ours to set; neither test is in a standard.
 */
export function judgeDrift(series: DailySeries, boundDb: number, fromDay = 0): DriftVerdict {
  const step = stepOf(series, fromDay);
  const slope = slopeOf(series, fromDay);
  const isStep = step !== null && Math.abs(step.changeDb) > boundDb && step.isClear;
  const isSlope = slope !== null && Math.abs(slope.changeDb) > boundDb && slope.isClear;
  const changes = [step?.changeDb, slope?.isClear ? slope.changeDb : undefined].filter(
    (change) => change !== undefined,
  );
  const changeDb = changes.reduce<number | null>(
    (most, change) => (most === null || Math.abs(change) > Math.abs(most) ? change : most),
    null,
  );
  return {
    state: isStep || isSlope ? 'drifting' : step === null ? 'unknown' : 'fine',
    changeDb,
    by: isStep ? 'step' : isSlope ? 'slope' : null,
    baselineDb: step?.baselineDb ?? null,
    recentDb: step?.recentDb ?? null,
    slopeDbPerDay: slope?.dbPerDay ?? null,
  };
}

function stepOf(series: DailySeries, fromDay: number) {
  const firstRecent = series.length - RECENT_DAYS;
  const recent = valuesIn(series, Math.max(fromDay, firstRecent), series.length);
  const endOfBaseline = firstRecent - GUARD_DAYS;
  const baseline = valuesIn(series, Math.max(fromDay, endOfBaseline - BASELINE_DAYS), endOfBaseline);
  const [recentDb, baselineDb] = [trimmedMean(recent), trimmedMean(baseline)];
  if (recentDb === null || baselineDb === null) return null;
  if (recent.length < LEAST_RECENT || baseline.length < LEAST_BASELINE) return null;
  const deviationDb = MAD_TO_DEVIATION * (median(baseline.map((value) => Math.abs(value - baselineDb))) ?? 0);
  const errorDb = deviationDb * Math.sqrt(1 / recent.length + 1 / baseline.length);
  const changeDb = recentDb - baselineDb;
  return { recentDb, baselineDb, changeDb, isClear: Math.abs(changeDb) > ERRORS_APART * errorDb };
}

function slopeOf(series: DailySeries, fromDay: number) {
  const weeks: { day: number; value: number }[] = [];
  const firstDay = Math.max(fromDay, series.length - SLOPE_DAYS);
  for (let end = series.length; end - WEEK_DAYS >= firstDay; end -= WEEK_DAYS) {
    const values = valuesIn(series, end - WEEK_DAYS, end);
    const value = median(values);
    if (value !== null && values.length >= LEAST_OF_WEEK) weeks.unshift({ day: end, value });
  }
  const [first, last] = [weeks[0], weeks.at(-1)];
  if (weeks.length < LEAST_WEEKS || !first || !last) return null;
  const slopes = weeks.flatMap((early, at) =>
    weeks.slice(at + 1).map((late) => (late.value - early.value) / (late.day - early.day)),
  );
  const dbPerDay = median(slopes) ?? 0;
  const tau = slopes.reduce((sum, slope) => sum + Math.sign(slope), 0) / slopes.length;
  return { dbPerDay, changeDb: dbPerDay * (last.day - first.day), isClear: Math.abs(tau) >= LEAST_TAU };
}

function valuesIn(series: DailySeries, fromDay: number, toDay: number): number[] {
  return series.slice(Math.max(0, fromDay), Math.max(0, toDay)).filter((value) => value !== null);
}
