import { z } from 'zod';
import { registerRoute } from './registry';
import { SPECTROGRAM_LAYOUT } from './spectrogramBinary';

const levels = z.array(z.number().nullable());

/** A spectrogram as JSON: every list has one entry a column. */
const spectrogramSchema = z.object({
  from: z.string().describe('Start of the first column; at or shortly before what was asked for'),
  to: z.string().describe('End of the last column'),
  stepSeconds: z.number().int(),
  timeZone: z.string(),
  source: z
    .enum(['intervals', 'quarter-hours'])
    .describe(
      'quarter-hours (periods of more than 14 days): levels of what counts only; intervals: of everything measured',
    ),
  bands: z.array(z.number()).describe('Nominal Hz of the rows of `levels`, ascending'),
  seconds: z.object({
    present: z.array(z.number().int()),
    valid: z.array(z.number().int()),
    late: z.array(z.number().int()).describe('Arrived more than an hour after their end'),
  }),
  reasons: z.array(z.array(z.string())).describe('Why seconds do not count'),
  flags: z.array(z.array(z.string())),
  LAeq: levels,
  LAFmax: levels,
  LAFmin: levels,
  levels: z
    .array(levels)
    .describe('By column, then by band; unweighted, dB; null where the monitor gave none'),
  percentiles: z
    .object({ seconds: z.number().int(), LA10: levels, LA50: levels, LA90: levels })
    .nullable()
    .describe(
      'Exceedance levels of the block of UTC, `seconds` long, that a column begins in; null unless asked for, and null entries where a block has too few samples',
    ),
});
export type Spectrogram = z.output<typeof spectrogramSchema>;

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/spectrogram',
  summary: 'Levels over time in equal steps, by band',
  request: {
    params: z.object({ network: z.string(), code: z.string() }),
    query: z.object({
      from: z.string(),
      to: z.string(),
      columns: z
        .string()
        .optional()
        .describe(
          'The most columns wanted, 4,000 unless given, 44,640 at most; steps are the finest that need no more',
        ),
      percentiles: z
        .enum(['none', 'A'])
        .optional()
        .describe('A: with LA10, LA50 and LA90 of blocks no shorter than a column'),
    }),
  },
  responses: {
    200: {
      description: `The columns; JSON, or by Accept: ${SPECTROGRAM_LAYOUT}`,
      content: {
        'application/json': { schema: spectrogramSchema },
        'application/octet-stream': { schema: z.string().meta({ format: 'binary' }) },
      },
    },
  },
});
