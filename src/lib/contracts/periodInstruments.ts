import { z } from 'zod';

/** An instrument that measured at a station in a part of a period. */
const periodInstrumentSchema = z.object({
  id: z.number().int(),
  serialNumber: z.string(),
  class: z.union([z.literal(1), z.literal(2)]),
  description: z.string(),
  microphone: z.string(),
  from: z.string().describe('Beginning of its part of the period'),
  to: z.string().describe('End of its part of the period'),
  lastCheck: z
    .object({
      at: z.string(),
      drift: z.number().describe('dB that it was off, before any adjustment'),
      isWithinBound: z.boolean(),
    })
    .nullable()
    .describe('The latest check with a calibrator before the end of its part; null: none is on record'),
});
export type PeriodInstrument = z.output<typeof periodInstrumentSchema>;

/** Which instruments made the figures of a period, in order of time. */
export const periodInstrumentsSchema = z
  .array(periodInstrumentSchema)
  .describe('Instruments on record for the period, in order of time; empty: none is on record');
