import { z } from 'zod';
import { clockTime } from './common';

export const DELIVERIES = ['at-once', 'hourly', 'daily'] as const;

const minutes = (most: number) =>
  z
    .number('must be a whole number of minutes')
    .int('must be a whole number of minutes')
    .min(0, 'must be at least 0')
    .max(most, `must be at most ${most}`);

/** How a person is told of a network's exceedances; clock times are the network's civil time. */
export const alertPreferencesSchema = z
  .object({
    delivery: z.enum(DELIVERIES, { error: 'must be one of the choices' }),
    dailyAt: clockTime.describe('When the daily digest is sent'),
    groupMinutes: minutes(240).describe(
      'Least minutes between two messages; what comes meanwhile is one message',
    ),
    quietFrom: clockTime.nullable(),
    quietTo: clockTime.nullable().describe('Over midnight where it is earlier than its beginning'),
    override: z
      .number('must be a number of dB')
      .min(0.1, 'must be at least 0.1 dB')
      .max(60, 'must be at most 60 dB')
      .nullable()
      .describe('dB above the limit from which neither digest nor quiet hours hold it back'),
    stations: z
      .array(z.string())
      .min(1, 'must name at least one station')
      .max(1000)
      .nullable()
      .describe('Codes; null: every station'),
    warnsEarly: z.boolean(),
  })
  .refine(({ quietFrom, quietTo }) => (quietFrom === null) === (quietTo === null), {
    path: ['quietTo'],
    error: 'needs both a beginning and an end, or neither',
  })
  .refine(({ quietFrom, quietTo }) => quietFrom === null || quietFrom !== quietTo, {
    path: ['quietTo'],
    error: 'must differ from the beginning',
  });
export type AlertPreferencesInput = z.output<typeof alertPreferencesSchema>;

/** A network has at most so many steps. */
export const MOST_STEPS = 3;

export const escalationStepSchema = z.object({
  afterMinutes: z
    .number('must be a whole number of minutes')
    .int('must be a whole number of minutes')
    .min(5, 'must be at least 5')
    .max(2880, 'must be at most 2880'),
  people: z.array(z.string()).min(1, 'must name at least one person').max(100),
});
export type EscalationStepInput = z.output<typeof escalationStepSchema>;
