import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { FLAGS, INVALIDITY_REASONS, invalidityReasons, type InvalidityReason } from '#lib/acoustics/validity';
import { type IntervalFacts } from '#lib/contracts/figureSheet';
import { formatDuration } from '#lib/format/durations';
import { INVALIDITY_WORDS } from '#lib/format/invalidityReason';
import {
  accumulate,
  firstEndingAfter,
  isExcluded,
  rulesSpans,
  withWeather,
  type Judgement,
} from '../levels/accumulate';
import { judgementOf, MOST_INTERVALS } from '../levels/intervalSums';
import { type Span } from '../levels/spans';
import { keptNote } from '../retention/kept';
import { BlockTones } from './blockTones';
import { type SheetSource } from './source';

/** Periods of up to this many intervals are read one by one: 70 days of minutes, 28 hours of seconds. */
const MOST_READ = 100_800;

/** What every interval of a period tells. */
export interface IntervalPass {
  /** Everything measured, counted or not. */
  raw: PeriodAccumulator;
  facts: IntervalFacts;
  tones: BlockTones;
}

/** Whether a period is short enough to be read interval by interval, and its intervals are kept. */
export function isReadable({
  station,
  period,
  keptFromSec,
}: Pick<SheetSource, 'station' | 'period' | 'keptFromSec'>): boolean {
  if (period.fromSec < keptFromSec) return false;
  return (period.toSec - period.fromSec) / station.intervalSec <= MOST_READ;
}

/** Why a period that is too long for it, or whose intervals are gone, is not read, in words. */
export function notReadWords({
  station,
  period,
  keptFromSec,
}: Pick<SheetSource, 'station' | 'period' | 'keptFromSec'>): string {
  const gone = keptNote(period.fromSec, keptFromSec);
  if (gone !== null) {
    return `Counts by reason, raw figures and tones block by block are not given: every interval has to be read for them. ${gone}`;
  }
  const longest = formatDuration(MOST_READ * station.intervalSec);
  return (
    `Counts by reason, raw figures and tones block by block are given of periods of up to ${longest} at this station, because ` +
    'every interval has to be read for them.'
  );
}

/** Reads every interval of the period once. */
export async function readIntervals(source: SheetSource): Promise<IntervalPass> {
  const { station, timeline, period, conn } = source;
  const judgement = await judgementOf({ station, timeline, validity: 'rules' }, period, conn);
  const everything: Judgement = { ...judgement, validity: 'all' };
  const raw = new PeriodAccumulator();
  const tones = new BlockTones();
  const tally = new Tally();
  const stepSec = MOST_INTERVALS * station.intervalSec;
  for (let fromSec = period.fromSec; fromSec < period.toSec; fromSec += stepSec) {
    const part = { fromSec, toSec: Math.min(fromSec + stepSec, period.toSec) };
    const intervals = await selectIntervals(station.id, part.fromSec, part.toSec, conn);
    raw.merge(accumulate(intervals, part, everything, { bandClasses: false }));
    tones.add(tally.note(intervals, part, judgement, fromSec === period.fromSec));
  }
  return { raw, facts: tally.facts(), tones };
}

class Tally {
  #counted = 0;
  #leftOut = 0;
  #underrangeSec = 0;
  #computedSec = 0;
  readonly #reasons = new Map<InvalidityReason, { intervals: number; sec: number }>();

  /** Notes the intervals of a part and answers those that count. */
  note(
    intervals: readonly StoredInterval[],
    part: Span,
    judgement: Judgement,
    isFirst: boolean,
  ): StoredInterval[] {
    const counted: StoredInterval[] = [];
    for (const span of rulesSpans(part.fromSec, part.toSec, judgement.timeline)) {
      for (let at = firstEndingAfter(intervals, span.fromSec); at < intervals.length; at += 1) {
        const interval = intervals[at];
        if (!interval || interval.startSec >= span.toSec) break;
        const endSec = interval.startSec + interval.durationSec;
        const sec = Math.min(endSec, span.toSec) - Math.max(interval.startSec, span.fromSec);
        // One that straddles two parts or two rules is counted once, where it begins.
        const one = interval.startSec >= span.fromSec || (isFirst && span.fromSec === part.fromSec) ? 1 : 0;
        const judged = withWeather(interval, judgement);
        const reasons = invalidityReasons(judged, span.rules, isExcluded(interval, judgement));
        if (reasons.length === 0) {
          this.#noteCounted(interval, one, sec);
          if (one === 1) counted.push(interval);
        } else {
          this.#noteLeftOut(reasons, one, sec);
        }
      }
    }
    return counted;
  }

  facts(): IntervalFacts {
    return {
      counted: this.#counted,
      leftOut: this.#leftOut,
      reasons: INVALIDITY_REASONS.flatMap((reason) => {
        const noted = this.#reasons.get(reason);
        return noted ? [{ reason: INVALIDITY_WORDS[reason], ...noted }] : [];
      }),
      underrangeSec: this.#underrangeSec,
      computedSec: this.#computedSec,
    };
  }

  #noteCounted({ flags }: StoredInterval, one: number, sec: number): void {
    this.#counted += one;
    if ((flags & FLAGS.underrange) !== 0) this.#underrangeSec += sec;
    if ((flags & FLAGS.laeqComputed) !== 0) this.#computedSec += sec;
  }

  #noteLeftOut(reasons: readonly InvalidityReason[], one: number, sec: number): void {
    this.#leftOut += one;
    for (const reason of reasons) {
      const noted = this.#reasons.get(reason) ?? { intervals: 0, sec: 0 };
      noted.intervals += one;
      noted.sec += sec;
      this.#reasons.set(reason, noted);
    }
  }
}
