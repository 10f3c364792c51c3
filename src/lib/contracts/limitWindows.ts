import { z } from 'zod';
import { LIMIT_WINDOWS, type LimitWindowName } from '#lib/acoustics/limitQuantities';

export const HOLIDAY_RULES = ['as-weekday', 'as-sunday', 'never', 'only'] as const;

export const GRAIN_MIN = 5;
const DAY_MIN = 1440;

/** Lengths of fixed windows: whole fives of minutes that divide the day. */
export const FIXED_LENGTHS_MIN = Array.from(
  { length: DAY_MIN / GRAIN_MIN },
  (_, at) => (at + 1) * GRAIN_MIN,
).filter((minutes) => DAY_MIN % minutes === 0);

const lengthText = `must be ${GRAIN_MIN} to ${DAY_MIN} minutes in steps of ${GRAIN_MIN}`;

/** Fields of a limit's windows. */
export const windowFields = {
  window: z
    .enum(LIMIT_WINDOWS, 'must be one of the list')
    .describe(
      '15min, 1h and length by the clock of the network; day, evening and night as the network has them; hours: one window a date, `from` to `to`; den: the day, evening and night of a date together',
    ),
  windowMinutes: z
    .number(lengthText)
    .int(lengthText)
    .min(GRAIN_MIN, lengthText)
    .max(DAY_MIN, lengthText)
    .multipleOf(GRAIN_MIN, lengthText)
    .nullable()
    .default(null)
    .describe('Of window `length`'),
  stepMinutes: z
    .union([z.literal(5), z.literal(15)], 'must be 5 or 15 minutes')
    .nullable()
    .default(null)
    .describe(
      'Rolling windows begin so often; null: fixed ones, that follow one another. Rolling windows above the limit, each a step ' +
        'after the other, are one exceedance',
    ),
};

export const holidayRule = z
  .enum(HOLIDAY_RULES, 'must be one of the list')
  .describe('What the named dates of the network are to it; only: whatever weekday they are');

/** What is looked at together. Clock times in minutes after midnight. */
export interface CheckedWindow {
  window: LimitWindowName;
  windowMinutes: number | null;
  stepMinutes: 5 | 15 | null;
  from: number | null;
  to: number | null;
}

type WindowIssue = [field: keyof CheckedWindow, message: string];

/** Minutes of a window by the clock; null for other windows. */
export function lengthMinutesOf({
  window,
  windowMinutes,
}: Pick<CheckedWindow, 'window' | 'windowMinutes'>): number | null {
  if (window === '15min') return 15;
  if (window === '1h') return 60;
  return window === 'length' ? windowMinutes : null;
}

/** What does not go together of a limit's windows. */
export function windowIssues(limit: CheckedWindow): WindowIssue[] {
  return [lengthIssue(limit), stepIssue(limit), clockIssue(limit)].filter((issue) => issue !== null);
}

function lengthIssue({ window, windowMinutes, stepMinutes }: CheckedWindow): WindowIssue | null {
  if (window !== 'length')
    return windowMinutes === null ? null : ['windowMinutes', 'goes with windows of another length only'];
  if (windowMinutes === null) return ['windowMinutes', 'must be given for windows of another length'];
  if (stepMinutes !== null || FIXED_LENGTHS_MIN.includes(windowMinutes)) return null;
  const before = FIXED_LENGTHS_MIN.findLast((minutes) => minutes < windowMinutes);
  const after = FIXED_LENGTHS_MIN.find((minutes) => minutes > windowMinutes);
  return [
    'windowMinutes',
    `must divide the day evenly where windows follow one another: ${before} or ${after} minutes, or rolling windows`,
  ];
}

function stepIssue(limit: CheckedWindow): WindowIssue | null {
  const { stepMinutes } = limit;
  if (stepMinutes === null) return null;
  const length = lengthMinutesOf(limit);
  if (limit.window !== 'length' && length === null)
    return ['stepMinutes', 'goes with windows of a length by the clock only'];
  if (length !== null && stepMinutes >= length) return ['stepMinutes', 'must be shorter than the window'];
  return null;
}

function clockIssue({ window, from, to }: CheckedWindow): WindowIssue | null {
  if (window === 'day' || window === 'evening' || window === 'night' || window === 'den') {
    if (from === null && to === null) return null;
    return [
      'from',
      `goes with windows of a length or with own hours; ${window === 'den' ? 'the date' : `the ${window}`} has its own hours: leave both out`,
    ];
  }
  if ((from === null) !== (to === null))
    return [from === null ? 'from' : 'to', 'must be given together with the other one'];
  if (from === null || to === null)
    return window === 'hours' ? ['from', 'must be given for own hours, with the end'] : null;
  if (from === to) return ['to', 'must differ from the beginning; leave both out for all day'];
  if (from === DAY_MIN) return ['from', 'must be from 00:00 to 23:59'];
  if (window === 'hours' && (from % GRAIN_MIN !== 0 || to % GRAIN_MIN !== 0))
    return ['from', `must be in steps of ${GRAIN_MIN} minutes, like the end`];
  return null;
}
