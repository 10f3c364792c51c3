import { z } from 'zod';
import { registerRoute } from './registry';

const level = (description: string) => z.number().nullable().describe(`${description}, dB`);

const bandMedians = z.array(z.object({ nominalHz: z.number(), median: z.number() }));

/** What is usual at a station for a clock window. */
export const usualSchema = z.object({
  from: z.string(),
  to: z.string(),
  weeks: z.number().int().describe('How many weeks before were looked at'),
  validWeeks: z.number().int().describe('How many of them had enough valid data; only these count'),
  LAeq: z.object({
    median: level('Median of LAeq over the same weekday and clock window of the weeks before'),
    low: level('10 % point'),
    high: level('90 % point'),
  }),
  bands: bandMedians.describe(
    'Median over the same weeks of the Leq of each band that had one, dB unweighted; thirds, or octaves of an octave station',
  ),
  octaves: bandMedians.describe('The same of octaves'),
});
export type UsualLevels = z.output<typeof usualSchema>;

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/usual',
  summary:
    'What is usual for a window of at most a day: the same weekday and clock window in the eight weeks before',
  request: {
    params: z.object({ network: z.string(), code: z.string() }),
    query: z.object({ from: z.string(), to: z.string() }),
  },
  responses: {
    200: { description: 'The usual level', content: { 'application/json': { schema: usualSchema } } },
  },
});
