import { PeriodAccumulator, type AccumulatedInterval } from './periodStatistics';
import { centiDbToTenths } from './rounding';

/** What makes an event. */
export interface EventRules {
  /** Base intervals above this level (strictly, in tenths of a dB of LAeq) belong to events. */
  thresholdTenths: number;
  /** Events shorter than this, from the first to the last interval above, are none. */
  minimumSec: number;
  /** Gaps up to this long, quieter or without valid data, do not end an event. */
  bridgedGapSec: number;
}

/** A base interval, whole, in order of time. */
export interface EventInterval extends AccumulatedInterval {
  startSec: number;
  isValid: boolean;
}

/** A run of base intervals above a threshold, from the first to the end of the last one above it. */
export interface SoundEvent {
  fromSec: number;
  toSec: number;
  /**
   * LAE, LAFmax, band levels and so on of everything valid from `fromSec` to `toSec`, bridged gaps included.
   */
  figures: PeriodAccumulator;
}

/**
 * Finds the events in base intervals.
 * @throws RangeError for intervals that are out of order or overlap.
 */
export function findEvents(intervals: readonly EventInterval[], rules: EventRules): SoundEvent[] {
  const events: SoundEvent[] = [];
  let open: SoundEvent | null = null;
  let sinceLastAbove: EventInterval[] = [];
  let previousEndSec = -Infinity;
  for (const interval of intervals) {
    if (interval.startSec < previousEndSec) throw new RangeError('Intervals overlap or are out of order.');
    previousEndSec = interval.startSec + interval.durationSec;
    const isAbove = interval.isValid && centiDbToTenths(interval.laeqCentiDb) > rules.thresholdTenths;
    if (!isAbove) {
      sinceLastAbove.push(interval);
      continue;
    }
    if (!open || interval.startSec - open.toSec > rules.bridgedGapSec) {
      open = { fromSec: interval.startSec, toSec: interval.startSec, figures: new PeriodAccumulator() };
      events.push(open);
      sinceLastAbove = [];
    }
    for (const part of [...sinceLastAbove, interval]) open.figures.add(part, part.isValid);
    open.toSec = previousEndSec;
    sinceLastAbove = [];
  }
  return events.filter((event) => event.toSec - event.fromSec >= rules.minimumSec);
}
