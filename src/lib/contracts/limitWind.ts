import { z } from 'zod';

const UNKNOWN_WIND_RULES = ['left-out', 'counts'] as const;

const MOST_MS = 40;
const speed = (description: string) =>
  z
    .number('must be a speed in m/s')
    .min(0, `must be 0 to ${MOST_MS} m/s`)
    .max(MOST_MS, `must be 0 to ${MOST_MS} m/s`)
    .refine((value) => Math.abs(value * 10 - Math.round(value * 10)) < 1e-6, 'must have at most one decimal')
    .nullable()
    .default(null)
    .describe(description);
const direction = (description: string) =>
  z
    .number('must be whole degrees, 0 to 359')
    .int('must be whole degrees, 0 to 359')
    .min(0, 'must be whole degrees, 0 to 359')
    .max(359, 'must be whole degrees, 0 to 359')
    .nullable()
    .default(null)
    .describe(description);

/** Fields of the wind that a limit goes by, beside the network's own bound. */
export const windFields = {
  windMinimum: speed('Intervals with a mean wind speed below do not count for this limit; m/s'),
  windMaximum: speed('Intervals with a mean wind speed above do not count for this limit; m/s'),
  windFrom: direction(
    'Only intervals with wind from the sector clockwise from here to windTo count; degrees, both included',
  ),
  windTo: direction('End of the sector; less than windFrom: across north'),
  windDismissAbove: speed(
    'A window whose mean wind speed, of all its measured intervals, is greater, is not compared; m/s, tenths are compared',
  ),
  windUnknown: z
    .enum(UNKNOWN_WIND_RULES, 'must be left-out or counts')
    .default('left-out')
    .describe(
      'What becomes of intervals whose speed or direction is not known, and of a window to be dismissed when the wind of less than half of ' +
        'what was measured is known: left-out (they do not count, the window is not compared) or counts',
    ),
};

export type CheckedWind = z.output<z.ZodObject<typeof windFields>>;
type WindIssue = [field: keyof CheckedWind, message: string];

/** What does not go together of a limit's wind. */
export function windIssues({ windMinimum, windMaximum, windFrom, windTo }: CheckedWind): WindIssue[] {
  const issues: WindIssue[] = [];
  if (windMinimum !== null && windMaximum !== null && windMaximum < windMinimum)
    issues.push(['windMaximum', 'must not be below the lowest']);
  if ((windFrom === null) !== (windTo === null))
    issues.push([windFrom === null ? 'windFrom' : 'windTo', 'must be given together with the other one']);
  return issues;
}
