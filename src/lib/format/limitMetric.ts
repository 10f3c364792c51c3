import { bandAt, bandLabel, type BandFraction } from '#lib/acoustics/bands';

/** What a limit is about. */
export interface LimitMetric {
  metric: 'LAeq' | 'LAFmax' | 'bandLeq';
  averaging: '15min' | '1h' | 'day' | 'evening' | 'night';
  /** Of a band limit, else null. */
  bandFraction: BandFraction | null;
  bandIndex: number | null;
}

const WINDOW_TEXT = {
  '15min': '15 min',
  '1h': '1 h',
  day: 'day',
  evening: 'evening',
  night: 'night',
} as const;

/**
 * A limit's metric in plain text: `LAeq,1 h`, `Lnight`, `LAFmax within 15 min`, `Leq,1 h of the 100 Hz third`. A descriptor in
 * it can be typeset by whoever shows it.
 */
export function limitMetricText({ metric, averaging, bandFraction, bandIndex }: LimitMetric): string {
  const window = WINDOW_TEXT[averaging];
  if (metric === 'LAFmax') {
    return `LAFmax within ${averaging === '15min' || averaging === '1h' ? window : `the ${window}`}`;
  }
  if (metric === 'LAeq') {
    return averaging === '15min' || averaging === '1h' ? `LAeq,${window}` : `L${window}`;
  }
  if (bandFraction === null || bandIndex === null) throw new RangeError('A band limit names no band.');
  const band = bandAt(bandFraction, bandIndex);
  return `Leq,${window} of the ${bandLabel(band)} ${bandFraction === 3 ? 'third' : 'octave'}`;
}
