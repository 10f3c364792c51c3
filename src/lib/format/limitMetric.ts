import { bandAt, bandLabel, type BandFraction } from '#lib/acoustics/bands';
import { clockTimeText } from './clockTime';
import { formatDuration } from './durations';

/** What a limit is about. */
export interface LimitMetric {
  metric: 'LAeq' | 'LAFmax' | 'bandLeq';
  averaging: '15min' | '1h' | 'day' | 'evening' | 'night' | 'length' | 'hours';
  /** Of averaging `length`. */
  windowMin?: number | null;
  /** Of rolling windows. */
  stepMin?: number | null;
  /** Of windows of their own hours: these, minutes after midnight. */
  fromMin: number | null;
  toMin: number | null;
  /** Of a band limit, else null. */
  bandFraction: BandFraction | null;
  bandIndex: number | null;
}

/**
 * A limit's metric in plain text: `LAeq,1 h`, `Lnight`, `LAFmax within 15 min`, `Leq,1 h of the 100 Hz third`, `LAeq,30 min rolling
 * by 5 min`. A descriptor in it can be typeset by whoever shows it.
 */
export function limitMetricText(limit: LimitMetric): string {
  return limit.stepMin ? `${fixedText(limit)}, rolling by ${limit.stepMin} min` : fixedText(limit);
}

function fixedText(limit: LimitMetric): string {
  const { metric, averaging } = limit;
  const isPeriod = averaging === 'day' || averaging === 'evening' || averaging === 'night';
  const window = windowText(limit);
  if (metric === 'LAFmax') return `LAFmax within ${isPeriod ? `the ${window}` : window}`;
  if (metric === 'LAeq') return isPeriod ? `L${window}` : `LAeq,${window}`;
  return `Leq,${window} of the ${bandText(limit)}`;
}

function windowText({ averaging, windowMin, fromMin, toMin }: LimitMetric): string {
  switch (averaging) {
    case '15min':
      return '15 min';
    case '1h':
      return '1 h';
    case 'length':
      return formatDuration((windowMin ?? 0) * 60);
    case 'hours':
      return `${clockTimeText(fromMin ?? 0)}–${clockTimeText(toMin ?? 0)}`;
    default:
      return averaging;
  }
}

function bandText({ bandFraction, bandIndex }: LimitMetric): string {
  if (bandFraction === null || bandIndex === null) throw new RangeError('A band limit names no band.');
  return `${bandLabel(bandAt(bandFraction, bandIndex))} ${bandFraction === 3 ? 'third' : 'octave'}`;
}
