import { bandAt, bandLabel, type BandFraction } from '#lib/acoustics/bands';
import type { LimitMetricName, LimitWindowName } from '#lib/acoustics/limitQuantities';
import { clockTimeText } from './clockTime';
import { formatDuration } from './durations';
import { formatDifferenceDb, formatLevelDb } from './levels';

/** What a limit is about. */
export interface LimitMetric {
  metric: LimitMetricName;
  averaging: LimitWindowName;
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
  /** Of a group of bands the last one. */
  bandToIndex?: number | null;
  /** Of an L_N, and of the background that a level is above (90 unless told). */
  percent?: number | null;
  /** What events are above, in tenths of a dB. */
  eventTenths?: number | null;
  /** Hours that the background is taken from, minutes after midnight; null: the window itself. */
  backgroundFromMin?: number | null;
  backgroundToMin?: number | null;
}

/** What a limit's values are given in. */
export type LimitUnit = 'dB' | '%' | 'events';

/** The unit of a limit's values. */
export function limitUnit(metric: LimitMetricName): LimitUnit {
  if (metric === 'tonalShare') return '%';
  return metric === 'eventCount' ? 'events' : 'dB';
}

/** "61.3 dB", "12.5 %", "14 events" of a limit or of what was measured against it. */
export function limitValueText(value: number | null, unit: LimitUnit): string {
  return unit === 'events' && value !== null ? `${value} events` : `${formatLevelDb(value)} ${unit}`;
}

/** The same for a cell of a column of levels, whose heading says dB: "61.3", "12.5 %", "14 events". */
export function limitCellText(value: number | null, unit: LimitUnit = 'dB'): string {
  return unit === 'dB' ? formatLevelDb(value) : limitValueText(value, unit);
}

/** By how much a value is above a limit, with its sign: "+2.3", "+4.0 %", "+3 events"; dB is said beside it. */
export function limitDifferenceText(value: number, unit: LimitUnit): string {
  if (unit === 'dB') return formatDifferenceDb(value);
  return value > 0 ? `+${limitValueText(value, unit)}` : limitValueText(value, unit);
}

/**
 * A limit's metric in plain text: `LAeq,1 h`, `Lnight`, `LAFmax within 15 min`, `Leq,1 h of the 100 Hz third`, `LAeq,30 min, rolling
 * by 5 min`. A descriptor in it can be typeset by whoever shows it.
 */
export function limitMetricText(limit: LimitMetric): string {
  return limit.stepMin ? `${fixedText(limit)}, rolling by ${limit.stepMin} min` : fixedText(limit);
}

function fixedText(limit: LimitMetric): string {
  const { metric, averaging } = limit;
  const isPeriod = averaging === 'day' || averaging === 'evening' || averaging === 'night';
  const window = windowText(limit);
  const within = isPeriod ? `the ${window}` : window;
  switch (metric) {
    case 'LAFmax':
    case 'LAE':
      return `${metric} within ${within}`;
    case 'LAeq':
      return isPeriod ? `L${window}` : `LAeq,${window}`;
    case 'LAN':
      return `LA${limit.percent ?? ''},${window}`;
    case 'Lden':
      return 'Lden of the date';
    case 'LCeqLessLAeq':
      return `LCeq − LAeq over ${within}`;
    case 'LAeqLessLA90':
      return backgroundText(limit, window, within);
    case 'LAeqLessUsual':
      return `LAeq,${window} above the usual`;
    case 'tonalShare':
      return `tonal share of ${within}, in per cent`;
    case 'eventCount':
      return `number of events above LAeq ${formatLevelDb((limit.eventTenths ?? 0) / 10)} dB within ${within}`;
    case 'eventLAE':
      return `LAE of one event above LAeq ${formatLevelDb((limit.eventTenths ?? 0) / 10)} dB within ${within}`;
    default:
      return `Leq,${window} of the ${bandsText(limit)}`;
  }
}

/** "LAeq − LA90 over 1 h", "LAeq,15 min − LA95 of the last 23:00–07:00". */
function backgroundText(limit: LimitMetric, window: string, within: string): string {
  const { percent, backgroundFromMin: from = null, backgroundToMin: to = null } = limit;
  const background = `LA${percent ?? 90}`;
  if (from === null || to === null) return `LAeq − ${background} over ${within}`;
  return `LAeq,${window} − ${background} of the last ${clockTimeText(from)}–${clockTimeText(to)}`;
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
    case 'den':
      return 'the date';
    default:
      return averaging;
  }
}

/** "100 Hz third", "50 Hz to 200 Hz thirds". */
function bandsText({ metric, bandFraction, bandIndex, bandToIndex }: LimitMetric): string {
  if (bandFraction === null || bandIndex === null) throw new RangeError('A band limit names no band.');
  const kind = bandFraction === 3 ? 'third' : 'octave';
  const label = (index: number) => bandLabel(bandAt(bandFraction, index));
  if (metric !== 'bandGroupLeq' || bandToIndex === null || bandToIndex === undefined)
    return `${label(bandIndex)} ${kind}`;
  return `${label(bandIndex)} to ${label(bandToIndex)} ${kind}s`;
}
