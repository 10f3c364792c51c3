import type { LimitMetric, NewLimitVersion } from '#db/queries/limits';
import { hasBackgroundHours } from '../limits/backgroundHours';

/**
 * What a trial reads of a quarter-hour: A-weighted energies and maxima, the distribution of levels and C-weighted energies too, or
 * bands.
 */
export type TrialParts = 'energies' | 'distributions' | 'bands';

/** What the windows of a quantity are added up from; null where the worker's way has to be gone, window by window. */
const PARTS_OF: Readonly<Record<LimitMetric, TrialParts | null>> = {
  LAeq: 'energies',
  LAFmax: 'energies',
  LAE: 'energies',
  LAN: 'distributions',
  LAeqLessLA90: 'distributions',
  LCeqLessLAeq: 'distributions',
  bandLeq: 'bands',
  bandGroupLeq: 'bands',
  Lden: null,
  LAeqLessUsual: null,
  tonalShare: null,
  eventCount: null,
  eventLAE: null,
};

/** Whether a quantity is measured window by window, from intervals or from many other windows. */
export function isFromIntervals(metric: LimitMetric): boolean {
  return PARTS_OF[metric] === null;
}

/** What a limit's windows are added up from: null, too, where the wind may dismiss them, or where they need a background of other hours. */
export function partsOf(
  rule: Pick<NewLimitVersion, 'metric' | 'windRule' | 'backgroundFromMin'>,
): TrialParts | null {
  const mayBeDismissed = (rule.windRule?.dismissAboveMs ?? null) !== null;
  return mayBeDismissed || hasBackgroundHours(rule) ? null : PARTS_OF[rule.metric];
}
