/** Quantities that a limit may be about. */
export const LIMIT_METRICS = [
  'LAeq',
  'LAFmax',
  'bandLeq',
  'LAN',
  'LAE',
  'Lden',
  'bandGroupLeq',
  'LCeqLessLAeq',
  'LAeqLessLA90',
  'LAeqLessUsual',
  'tonalShare',
  'eventCount',
  'eventLAE',
] as const;
export type LimitMetricName = (typeof LIMIT_METRICS)[number];

/** Windows that a limit may have. `length`: of some minutes; `hours`: one of its own hours each date; `den`: all periods of a date. */
export const LIMIT_WINDOWS = ['15min', '1h', 'day', 'evening', 'night', 'length', 'hours', 'den'] as const;
export type LimitWindowName = (typeof LIMIT_WINDOWS)[number];

/** Quantities that are made of events. */
export const EVENT_METRICS: readonly LimitMetricName[] = ['eventCount', 'eventLAE'];

/** Whether a quantity is compared at any coverage: what was measured of a maximum, or of events, did occur, however little else was. */
export function needsNoCoverage(metric: LimitMetricName): boolean {
  return metric === 'LAFmax' || EVENT_METRICS.includes(metric);
}
