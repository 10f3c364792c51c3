import { z } from 'zod';

/** Wind of a period by one source: the station's own sensor, or a mast for the time that it was assigned to the station. */
export const windSourceSchema = z.object({
  source: z
    .enum(['station', 'mast'])
    .describe('Where an interval has a wind speed of its own, that decides its validity; else the mast does'),
  mast: z.object({ code: z.string(), name: z.string() }).nullable(),
  from: z.string(),
  to: z.string(),
  seconds: z
    .number()
    .nullable()
    .describe('Recorded; null like the figures after it where these are not told'),
  meanSpeed: z.number().nullable().describe('m/s'),
  maximumSpeed: z.number().nullable().describe('Of one record, m/s'),
  direction: z.number().nullable().describe('Mean, degrees from; null: none or from nowhere in particular'),
});
export type WindSource = z.output<typeof windSourceSchema>;

/** What a figure's wind was told by. */
export const windSourcesSchema = z
  .array(windSourceSchema)
  .describe(
    'By what the wind of the period is known. Of a period of more than seven days the sources alone are told; empty: no sensor, no mast',
  );
