import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import { type MeasuredInterval } from '#db/queries/intervalRows';
import { type BandInterval } from '#lib/acoustics/bandClassCounting';
import { PeriodAccumulator, type AccumulatedInterval } from '#lib/acoustics/periodStatistics';
import { countsInWind, type KnownWind, type WindRule } from '#lib/acoustics/windRule';
import { isValid, type JudgedInterval, type ValidityRules } from '#lib/acoustics/validity';
import { QUARTER_SEC } from '#lib/time/quarters';
import { type StationWeather } from '../weather/stationWeather';
import { overlapsAny, type Span } from './spans';

/** Whether validity rules and exclusions leave intervals out (`rules`), or everything measured counts (`all`). */
export type Validity = 'rules' | 'all';

/** What decides which intervals count. */
export interface Judgement {
  validity: Validity;
  /** The network's settings in order of their beginning. */
  timeline: NetworkSettings[];
  /** Standing exclusions of the station, merged. An interval that one of them overlaps is left out whole. */
  exclusions: readonly Span[];
  /** What masts tell of the weather at the station; left out or null: no mast is assigned. */
  weather?: StationWeather | null;
  /** Of a limit that goes by the wind: which intervals count for it, of those that count in the network. */
  wind?: WindRule | null;
}

/** A stretch in which one set of validity rules holds: each quarter-hour goes by the settings at its start. */
export interface RulesSpan extends Span {
  rules: ValidityRules;
}

/** The stretches of `fromSec <= t < toSec` in which the same rules hold, ascending. */
export function rulesSpans(fromSec: number, toSec: number, timeline: NetworkSettings[]): RulesSpan[] {
  const [only] = timeline;
  if (only && timeline.length === 1) return [{ fromSec, toSec, rules: only.rules }];
  const changes = timeline
    .map(({ effectiveFromSec }) => Math.ceil(effectiveFromSec / QUARTER_SEC) * QUARTER_SEC)
    .filter((change) => fromSec < change && change < toSec);
  const edges = [fromSec, ...new Set(changes), toSec];
  return edges.slice(1).map((end, at) => {
    const start = edges[at] ?? fromSec;
    const quarter = Math.floor(start / QUARTER_SEC) * QUARTER_SEC;
    return { fromSec: start, toSec: end, rules: pickSettings(timeline, quarter).rules };
  });
}

/** Whether an interval counts under some rules. */
export function counts(interval: MeasuredInterval, rules: ValidityRules, judgement: Judgement): boolean {
  if (judgement.validity === 'all') return true;
  if (!isValid(withWeather(interval, judgement), rules, isExcluded(interval, judgement))) return false;
  return !judgement.wind || countsInWind(judgement.wind, windOf(interval, judgement));
}

/** Wind of an interval, by the station's own sensor before its mast's. */
export function windOf(
  { startSec, durationSec, windSpeedMs, windDirectionDeg }: MeasuredInterval,
  { weather }: Judgement,
): KnownWind {
  return {
    speedMs: windSpeedMs ?? weather?.during(startSec, durationSec)?.windSpeedMs ?? null,
    directionDeg: windDirectionDeg ?? weather?.directionDuring(startSec, durationSec) ?? null,
  };
}

/** An interval with what its station's mast tells of it, where its own sensor tells no wind. */
export function withWeather(interval: MeasuredInterval, { weather }: Judgement): JudgedInterval {
  if (!weather || interval.windSpeedMs !== null) return interval;
  const mast = weather.during(interval.startSec, interval.durationSec);
  return { flags: interval.flags, windSpeedMs: null, mast };
}

/** Whether a standing exclusion overlaps an interval. */
export function isExcluded({ startSec, durationSec }: MeasuredInterval, { exclusions }: Judgement): boolean {
  return exclusions.length > 0 && overlapsAny(exclusions, startSec, startSec + durationSec);
}

/** Index of the first of some ascending, disjoint intervals that ends after an instant. */
export function firstEndingAfter(intervals: readonly MeasuredInterval[], sec: number): number {
  let low = 0;
  let high = intervals.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    const interval = intervals[middle];
    if (interval && interval.startSec + interval.durationSec <= sec) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * Sums of `fromSec <= t < toSec` from a station's intervals (ascending, disjoint; more than the period's may be given). An
 * interval that straddles an edge is clipped to the period by duration; its extremes count.
 */
export function accumulate(
  intervals: readonly MeasuredInterval[],
  period: Span,
  judgement: Judgement,
  options: { bandClasses: boolean },
): PeriodAccumulator {
  const accumulator = new PeriodAccumulator();
  eachClipped(intervals, period, judgement, (interval, isCounted) => accumulator.add(interval, isCounted));
  if (options.bandClasses) countBandClasses(accumulator, intervals, period, judgement);
  return accumulator;
}

/** Counts the distributions of every band and octave of a period into sums that have all else of it. */
export function countBandClasses(
  accumulator: PeriodAccumulator,
  intervals: readonly MeasuredInterval[],
  period: Span,
  judgement: Judgement,
): void {
  const counted: BandInterval[] = [];
  eachClipped(intervals, period, judgement, (interval, isCounted) => {
    if (!isCounted) return;
    const { durationSec, bandFraction, bandIndices, levelsCentiDb } = interval;
    counted.push({ durationSec, bandFraction, bandIndices, levelsCentiDb });
  });
  accumulator.countBandClasses(counted);
}

/** Every interval of a period clipped to it, and whether it counts. The object is filled again for the next. */
function eachClipped(
  intervals: readonly MeasuredInterval[],
  { fromSec, toSec }: Span,
  judgement: Judgement,
  use: (interval: AccumulatedInterval, isCounted: boolean) => void,
): void {
  const clipped = { ...NO_CLIP };
  for (const span of rulesSpans(fromSec, toSec, judgement.timeline)) {
    for (let at = firstEndingAfter(intervals, span.fromSec); at < intervals.length; at += 1) {
      const interval = intervals[at];
      if (!interval || interval.startSec >= span.toSec) break;
      const endSec = interval.startSec + interval.durationSec;
      const durationSec = Math.min(endSec, span.toSec) - Math.max(interval.startSec, span.fromSec);
      use(clip(clipped, interval, durationSec), counts(interval, span.rules, judgement));
    }
  }
}

/** One object is filled again for each interval: a month has tens of thousands, and they are summed at once. */
function clip(
  into: AccumulatedInterval,
  interval: MeasuredInterval,
  durationSec: number,
): AccumulatedInterval {
  into.durationSec = durationSec;
  into.sampleSec = interval.durationSec;
  into.laeqCentiDb = interval.laeqCentiDb;
  into.lafmaxCentiDb = interval.lafmaxCentiDb;
  into.lafminCentiDb = interval.lafminCentiDb;
  into.lceqCentiDb = interval.lceqCentiDb;
  into.lcpeakCentiDb = interval.lcpeakCentiDb;
  into.bandFraction = interval.bandFraction;
  into.levelsCentiDb = interval.levelsCentiDb;
  into.bandIndices = interval.bandIndices;
  return into;
}

const NO_CLIP: AccumulatedInterval = {
  durationSec: 0,
  sampleSec: 0,
  laeqCentiDb: 0,
  lafmaxCentiDb: null,
  lafminCentiDb: null,
  lceqCentiDb: null,
  lcpeakCentiDb: null,
  bandFraction: 3,
  levelsCentiDb: new Int16Array(0),
  bandIndices: new Int8Array(0),
};
