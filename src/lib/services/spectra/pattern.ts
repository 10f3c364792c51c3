/** Minutes of a bin of the clock. */
const BIN_MINUTES = 10;
const BINS = 1440 / BIN_MINUTES;
const WEEKDAYS = 7;

/** When alike minutes came, by the network's civil time. */
export interface Pattern {
  /** Alike minutes of every hour of the clock, 24. */
  hours: number[];
  /** Alike minutes of every weekday, Monday first. */
  weekdays: number[];
  /** The shortest stretch of the clock that holds most of them, in minutes of the day; null: spread over the day. */
  stretch: { fromMinute: number; toMinute: number } | null;
  days: 'weekdays' | 'weekends' | 'any';
}

/** Share of minutes that is called most of them. */
const MOST = 0.8;
/** A longer stretch says nothing. */
const LONGEST_STRETCH_BINS = 36;
/** Even days would give 2/7 to weekends. */
const WEEKEND_SHARE = 0.7;
const WEEKDAY_SHARE = 0.95;

/** Counts alike minutes by weekday and clock. */
export class PatternCounter {
  readonly counts = new Uint32Array(WEEKDAYS * BINS);

  /** Counts a minute of the week (0: Monday, 00:00). */
  add(weekMinute: number): void {
    const at = Math.floor(weekMinute / BIN_MINUTES);
    this.counts[at] = (this.counts[at] ?? 0) + 1;
  }

  pattern(): Pattern {
    return patternOf(this.counts);
  }
}

function patternOf(counts: Uint32Array): Pattern {
  const hours = new Array<number>(24).fill(0);
  const weekdays = new Array<number>(WEEKDAYS).fill(0);
  const bins = new Array<number>(BINS).fill(0);
  counts.forEach((count, at) => {
    const bin = at % BINS;
    const hour = Math.floor((bin * BIN_MINUTES) / 60);
    const weekday = Math.floor(at / BINS);
    hours[hour] = (hours[hour] ?? 0) + count;
    weekdays[weekday] = (weekdays[weekday] ?? 0) + count;
    bins[bin] = (bins[bin] ?? 0) + count;
  });
  const total = bins.reduce((sum, count) => sum + count, 0);
  const weekendShare = ((weekdays[5] ?? 0) + (weekdays[6] ?? 0)) / Math.max(1, total);
  const days =
    weekendShare >= WEEKEND_SHARE ? 'weekends' : 1 - weekendShare >= WEEKDAY_SHARE ? 'weekdays' : 'any';
  return { hours, weekdays, stretch: shortestStretch(bins, total), days: total === 0 ? 'any' : days };
}

/** Over midnight too: `toMinute` is then the smaller. */
function shortestStretch(bins: readonly number[], total: number): Pattern['stretch'] {
  if (total === 0) return null;
  for (let length = 1; length <= LONGEST_STRETCH_BINS; length += 1) {
    let best = { sum: 0, from: 0 };
    for (let from = 0; from < BINS; from += 1) {
      let sum = 0;
      for (let at = from; at < from + length; at += 1) sum += bins[at % BINS] ?? 0;
      if (sum > best.sum) best = { sum, from };
    }
    if (best.sum >= MOST * total) {
      const toMinute = ((best.from + length) * BIN_MINUTES) % 1440;
      return { fromMinute: best.from * BIN_MINUTES, toMinute };
    }
  }
  return null;
}
