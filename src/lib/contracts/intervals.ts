import { z } from 'zod';
import { FLAG_NAMES, INVALIDITY_REASONS } from '#lib/acoustics/validity';
import { parseInstant } from './common';
import { registerRoute } from './registry';

export const MOST_INTERVALS = 10_000;
export const MOST_BODY_BYTES = 8 * 1024 * 1024;

/** Lowest and highest value that each field of an interval may have. */
export const BOUNDS = {
  seconds: [1, 3600],
  level: [-30, 200],
  windSpeed: [0, 100],
  windDirection: [0, 360],
  temperature: [-90, 90],
  battery: [0, 100],
} as const satisfies Record<string, readonly [number, number]>;

const number = ([lowest, highest]: readonly [number, number]) => z.number().min(lowest).max(highest);
const optional = (bounds: readonly [number, number]) => number(bounds).nullable().optional();

/** One interval as a monitor posts it. The receiver checks records by the same bounds, record by record. */
export const postedIntervalSchema = z.object({
  start: z.string().describe('RFC 3339, whole seconds, any offset'),
  seconds: z.number().int().min(BOUNDS.seconds[0]).max(BOUNDS.seconds[1]),
  LAeq: optional(BOUNDS.level).describe(
    'May be left out only where thirds cover 50 Hz–8 kHz or octaves 63 Hz–8 kHz, none null',
  ),
  LAFmax: optional(BOUNDS.level),
  LAFmin: optional(BOUNDS.level),
  LCeq: optional(BOUNDS.level),
  LCpeak: optional(BOUNDS.level),
  levels: z
    .array(number(BOUNDS.level).nullable())
    .nullable()
    .optional()
    .describe('Unweighted band Leq in the order of `bands`; null where the monitor has none'),
  flags: z.array(z.enum(FLAG_NAMES)).nullable().optional(),
  windSpeed: optional(BOUNDS.windSpeed).describe('m/s'),
  windDirection: optional(BOUNDS.windDirection).describe('degrees from'),
  temperature: optional(BOUNDS.temperature).describe('°C'),
  battery: optional(BOUNDS.battery).describe('V'),
});

const MOST_BANDS = 33;

/** What a monitor posts, as far as it concerns all of its records: each of those is checked by itself. */
export const intervalBatchSchema = z.object({
  bands: z
    .array(z.number('must be a number'), 'must be a list of frequencies')
    .max(MOST_BANDS, `must have at most ${MOST_BANDS} frequencies`)
    .default([])
    .describe('Nominal mid-band frequencies, Hz, ascending, all octave or all one-third-octave'),
  sentAt: z
    .string('must be an RFC 3339 time')
    .refine((text) => parseInstant(text) !== null, 'must be an RFC 3339 time')
    .nullable()
    .optional()
    .describe('The monitor’s clock when it sends'),
  intervals: z
    .array(z.unknown(), 'must be a list')
    .min(1, 'must not be empty')
    .max(MOST_INTERVALS, `must have at most ${MOST_INTERVALS} records`),
});

/** Why a record was refused. */
export const REFUSAL_CODES = [
  'malformed',
  'out-of-range',
  'clock-ahead',
  'too-old',
  'overlap',
  'conflict',
  'unknown-band',
] as const;
export type RefusalCode = (typeof REFUSAL_CODES)[number];

export const receiptSchema = z.object({
  accepted: z.number().int(),
  known: z.number().int().describe('Identical to what is stored already'),
  refused: z.array(
    z.object({
      index: z.number().int().describe('Place in `intervals`'),
      code: z.enum(REFUSAL_CODES),
      detail: z.string(),
      quarantined: z.boolean().describe('Kept for the operator; only one of unheard-of length is not'),
    }),
  ),
  serverTime: z.string(),
});
export type Receipt = z.output<typeof receiptSchema>;

const lastIntervalSchema = z.object({
  lastStart: z.string().nullable(),
  gaps: z
    .array(z.object({ from: z.string(), to: z.string() }))
    .describe('Of the last seven days, at most 200'),
});
export type LastInterval = z.output<typeof lastIntervalSchema>;

const level = z.number().nullable();

const storedIntervalSchema = z.object({
  start: z.string(),
  seconds: z.number().int(),
  LAeq: z.number(),
  isLAeqComputed: z.boolean().describe('Computed from the bands, because the monitor left it out'),
  LAFmax: level,
  LAFmin: level,
  LCeq: level,
  LCpeak: level,
  levels: z.array(level).describe('Beside `bands` of the answer'),
  flags: z.array(z.enum(FLAG_NAMES)),
  windSpeed: level,
  windDirection: level,
  temperature: level,
  battery: level,
  validity: z
    .array(z.enum(INVALIDITY_REASONS))
    .describe('Reasons for which it does not count in statistics; empty when it counts'),
});

const intervalListSchema = z.object({
  bands: z.array(z.number()).describe('Nominal frequencies, Hz, of the page’s levels'),
  items: z.array(storedIntervalSchema),
  next: z.string().nullable(),
  keptFrom: z
    .string()
    .nullable()
    .describe('Where the period reaches back further: single intervals before are no longer kept'),
});
export type IntervalList = z.output<typeof intervalListSchema>;

const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});

registerRoute({
  access: 'station',
  method: 'post',
  path: '/api/v1/intervals',
  summary: 'A monitor posts intervals',
  description:
    'At most 10,000 intervals and 8 MiB unpacked; Content-Encoding gzip is welcome. The answer comes once everything accepted is ' +
    'durable. After 429 and 503 keep the records and try again after Retry-After seconds.',
  request: {
    body: {
      content: {
        'application/json': {
          schema: intervalBatchSchema.extend({
            intervals: z.array(postedIntervalSchema).min(1).max(MOST_INTERVALS),
          }),
        },
      },
    },
  },
  responses: { 200: answer('What became of each record', receiptSchema) },
});

registerRoute({
  access: 'station',
  method: 'get',
  path: '/api/v1/intervals/last',
  summary: 'Where a monitor goes on, and what is missing',
  responses: { 200: answer('The last start and the gaps', lastIntervalSchema) },
});

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/intervals',
  summary: 'Intervals as stored (CSV by Accept or .csv)',
  request: {
    params: z.object({ network: z.string(), code: z.string() }),
    query: z.object({
      from: z.string(),
      to: z.string(),
      limit: z.coerce.number().int().min(1).max(MOST_INTERVALS).optional(),
      cursor: z.string().optional(),
    }),
  },
  responses: {
    200: {
      description: 'A page of intervals; as CSV the whole period, at most 100,000 intervals',
      content: { 'application/json': { schema: intervalListSchema }, 'text/csv': { schema: z.string() } },
    },
  },
});
