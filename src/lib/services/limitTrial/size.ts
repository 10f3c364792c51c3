import { lengthMinutesOf } from '#lib/contracts/limitWindows';
import type { LimitTrialQuery } from '#lib/contracts/limitTrial';
import type { FieldProblem, LimitRule } from '#lib/services/limits/rule';
import { isFromIntervals, partsOf } from './parts';

/** Parts that rolling windows of more than energies are added up from: some seconds of work. */
const MOST_MERGED_PARTS = 4e6;
/** Trials of more days that read every interval are long. */
const MOST_SHORT_DAYS = 31;
const DAY_MS = 86_400_000;

/** Whether a trial takes so long that it is done beside the other work of its process: it reads intervals, of more than a month. */
export function isLong(query: LimitTrialQuery): boolean {
  const { metric, backgroundFrom } = query.limit;
  const isOfIntervals =
    isFine(query.limit) ||
    WIND_FIELDS.some((field) => query.limit[field] !== null) ||
    backgroundFrom !== null ||
    isFromIntervals(metric);
  return isOfIntervals && daysOf(query) > MOST_SHORT_DAYS;
}

/** Why a trial at so many stations is too large, at the field that makes it so; null where it is not. */
export function sizeProblem(
  query: LimitTrialQuery,
  rule: LimitRule,
  stationCount: number,
): FieldProblem | null {
  const { stepMinutes } = query.limit;
  if (stepMinutes === null || partsOf(rule) === 'energies') return null;
  const partMin = isFine(query.limit) ? 5 : 15;
  const parts =
    stationCount * daysOf(query) * (1440 / stepMinutes) * ((lengthMinutesOf(query.limit) ?? 0) / partMin);
  const message = 'makes too many windows to try at once: take fewer days or stations, or a shorter window';
  return parts > MOST_MERGED_PARTS ? { field: 'stepMinutes', message } : null;
}

/** Whether windows are not of whole quarter-hours, so that every interval is read for them. */
function isFine(limit: LimitTrialQuery['limit']): boolean {
  const isRagged =
    limit.window === 'hours' && [limit.from, limit.to].some((minute) => (minute ?? 0) % 15 !== 0);
  return isRagged || (lengthMinutesOf(limit) ?? 0) % 15 !== 0 || limit.stepMinutes === 5;
}

function daysOf({ from, to }: LimitTrialQuery): number {
  return (Date.parse(to) - Date.parse(from)) / DAY_MS;
}

const WIND_FIELDS = ['windMinimum', 'windMaximum', 'windFrom', 'windDismissAbove'] as const;
