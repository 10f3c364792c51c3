import { z } from 'zod';
import { BOUNDS } from './intervals';
import { instant } from './common';
import { registerRoute } from './registry';

export const MOST_SELF_CHECKS = 1000;

const level = z
  .number('must be a number')
  .min(BOUNDS.level[0], `must be at least ${BOUNDS.level[0]}`)
  .max(BOUNDS.level[1], `must be at most ${BOUNDS.level[1]}`);

export const selfChecksSchema = z.object({
  checks: z
    .array(
      z.object({
        at: instant,
        level: level.describe('dB, what the monitor measured of its own source'),
        nominal: level.describe('dB, what it should have measured'),
      }),
      'must be a list',
    )
    .min(1, 'must not be empty')
    .max(MOST_SELF_CHECKS, `must have at most ${MOST_SELF_CHECKS} checks`),
});
export type SelfChecks = z.output<typeof selfChecksSchema>;

const selfCheckReceiptSchema = z.object({
  accepted: z.number().int(),
  known: z.number().int().describe('Identical to what is stored already'),
  refused: z.array(
    z.object({
      index: z.number().int(),
      code: z.enum(['clock-ahead', 'conflict']),
      detail: z.string(),
    }),
  ),
  serverTime: z.string(),
});
export type SelfCheckReceipt = z.output<typeof selfCheckReceiptSchema>;

const verdictSchema = z.object({
  state: z.enum(['fine', 'drifting', 'unknown']).describe('`unknown`: too few days to say'),
  by: z.enum(['step', 'slope']).nullable(),
  change: z.number().nullable().describe('dB from the baseline, or along the slope'),
  bound: z.number().describe('dB'),
  baseline: z.number().nullable().describe('dB, trimmed mean of eight weeks'),
  recent: z.number().nullable().describe('dB, trimmed mean of the last ten days'),
});
export type DriftVerdictJson = z.output<typeof verdictSchema>;

const driftSchema = z.object({
  station: z.string(),
  from: z.string().describe('Local date of the first night'),
  to: z.string().describe('Exclusive'),
  neighbours: z.array(z.string()).describe('Stations that it is compared with, nearest first'),
  since: z
    .string()
    .nullable()
    .describe('Local date from which on nights count: another instrument, or an adjustment; null: all do'),
  background: verdictSchema,
  selfCheck: verdictSchema,
  days: z.array(
    z.object({
      date: z.string(),
      LA90: z
        .number()
        .nullable()
        .describe('Of the night that begins on the date; null below the minimum coverage'),
      coverage: z.number().nullable().describe('Of the night'),
      difference: z
        .number()
        .nullable()
        .describe('dB about its own median, less the median of the neighbours’ about theirs'),
      selfCheck: z.number().nullable().describe('dB, median of level less nominal of the date'),
    }),
  ),
  marks: z.array(
    z.object({
      date: z.string(),
      kind: z.enum(['deployment', 'check', 'adjustment']),
      words: z.string(),
    }),
  ),
});
export type Drift = z.output<typeof driftSchema>;

const params = z.object({ network: z.string(), code: z.string() });
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});

registerRoute({
  access: 'station',
  method: 'post',
  path: '/api/v1/self-checks',
  summary: 'A monitor posts what it measured of its own source',
  description: 'The same check again is known. After 429 and 503 keep the checks and try again.',
  request: { body: { content: { 'application/json': { schema: selfChecksSchema } } } },
  responses: { 200: answer('What became of each check', selfCheckReceiptSchema) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/drift',
  summary: 'Half a year of nightly backgrounds against the neighbours, and of self-checks',
  description:
    'Common practice with stations that hear the same weather, in no standard. Nothing is ever corrected by it.',
  request: { params },
  responses: { 200: answer('Nights, verdicts and marks', driftSchema) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/drift.csv',
  summary: 'The same nights as CSV',
  request: { params },
  responses: { 200: { description: 'One line a date', content: { 'text/csv': { schema: z.string() } } } },
});
