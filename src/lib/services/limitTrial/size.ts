import type { LimitMetric } from '#db/queries/limits';
import { lengthMinutesOf } from '#lib/contracts/limitWindows';
import type { LimitTrialQuery } from '#lib/contracts/limitTrial';
import { hasBackgroundHours } from '#lib/services/limits/backgroundHours';
import type { FieldProblem, LimitRule } from '#lib/services/limits/rule';
import { partsOf } from './parts';

/** Windows that are not whole quarter-hours are tried on so many days: every interval is read for them. */
export const MOST_FINE_DAYS = 92;
/** Quantities that read intervals, or weeks before, window by window. */
const SLOW: readonly LimitMetric[] = ['LAeqLessUsual', 'tonalShare', 'eventCount', 'eventLAE'];
/** Parts that rolling windows of more than energies are added up from: some seconds of work. */
const MOST_MERGED_PARTS = 4e6;
const DAY_MS = 86_400_000;

/** Why a trial at so many stations is too large to be answered at once, at the field that makes it so; null where it is not. */
export function sizeProblem(
  { limit, from, to }: LimitTrialQuery,
  rule: LimitRule,
  stationCount: number,
): FieldProblem | null {
  const days = (Date.parse(to) - Date.parse(from)) / DAY_MS;
  const lengthMin = lengthMinutesOf(limit) ?? 0;
  const { stepMinutes, window, metric } = limit;
  const isRagged = window === 'hours' && [limit.from, limit.to].some((minute) => (minute ?? 0) % 15 !== 0);
  const isFine = lengthMin % 15 !== 0 || stepMinutes === 5 || isRagged;
  if (isFine && days > MOST_FINE_DAYS) {
    const field = isRagged ? 'from' : stepMinutes === 5 ? 'stepMinutes' : 'windowMinutes';
    const message = `is tried on at most ${MOST_FINE_DAYS} days, because every interval is read for it; whole quarter-hours on a year`;
    return { field, message };
  }
  const slowField = rule.windRule ? windField(limit) : hasBackgroundHours(rule) ? 'backgroundFrom' : 'metric';
  if ((SLOW.includes(metric) || slowField !== 'metric') && days > MOST_FINE_DAYS)
    return {
      field: slowField,
      message: `is tried on at most ${MOST_FINE_DAYS} days, because it reads much for each window`,
    };
  if (stepMinutes === null || partsOf(rule) === 'energies') return null;
  const parts = stationCount * days * (1440 / stepMinutes) * (lengthMin / (isFine ? 5 : 15));
  const message = 'makes too many windows to try at once: take fewer days or stations, or a shorter window';
  return parts > MOST_MERGED_PARTS ? { field: 'stepMinutes', message } : null;
}

/** The first field that says something of the wind. */
function windField(limit: LimitTrialQuery['limit']): FieldProblem['field'] {
  return WIND_FIELDS.find((field) => limit[field] !== null) ?? 'windMinimum';
}

const WIND_FIELDS = ['windMinimum', 'windMaximum', 'windFrom', 'windDismissAbove'] as const;
