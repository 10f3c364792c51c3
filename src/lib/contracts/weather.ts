import { z } from 'zod';
import type { MeanWind } from '../acoustics/mastWeather';
import { instant, parseInstant, shortText } from './common';
import { BOUNDS, receiptSchema, type Receipt } from './intervals';
import { registerRoute } from './registry';

/** Records in one post or one file. */
export const MOST_WEATHER_RECORDS = 50_000;

const within = ([lowest, highest]: readonly [number, number]) =>
  z.number('is not a number').min(lowest, `is below ${lowest}`).max(highest, `is above ${highest}`);

const RAIN_MM = [0, 500] as const;

/** One record as a mast posts it. The receiver checks them one by one. */
export const weatherRecordSchema = z.object({
  start: z
    .string('is not an RFC 3339 time')
    .refine((text) => Number.isInteger(parseInstant(text)), 'is not an RFC 3339 time of whole seconds')
    .describe('RFC 3339, whole seconds, any offset'),
  seconds: within(BOUNDS.seconds).int('is not whole').describe('Length of the record'),
  windSpeed: within(BOUNDS.windSpeed).describe('Mean, m/s'),
  windDirection: within(BOUNDS.windDirection).nullish().describe('Degrees from'),
  rain: within(RAIN_MM).nullish().describe('Fallen in the record, mm; left out where there is no gauge'),
  temperature: within(BOUNDS.temperature).nullish().describe('°C'),
});

/** What a mast posts, as far as it concerns all of its records. */
export const weatherBatchSchema = z.object({
  records: z
    .array(z.unknown(), 'must be a list')
    .min(1, 'must not be empty')
    .max(MOST_WEATHER_RECORDS, `must have at most ${MOST_WEATHER_RECORDS} records`),
});

const code = z
  .string('must be text')
  .trim()
  .regex(/^[A-Za-z0-9][A-Za-z0-9_-]{0,19}$/, 'must be 1 to 20 letters, digits, - or _, such as MER-W1');
const degrees = (most: number) =>
  z
    .number('must be a number of degrees')
    .min(-most, `must be −${most} to ${most}`)
    .max(most, `must be −${most} to ${most}`);

const mastFactsSchema = z.object({
  name: shortText,
  latitude: degrees(90),
  longitude: degrees(180),
  height: z
    .number('must be a number of metres')
    .min(0, 'must be 0 to 300 m')
    .max(300, 'must be 0 to 300 m')
    .describe('Anemometer above ground, m'),
  maximumAge: z
    .number('must be a number of minutes')
    .int('must be whole minutes')
    .min(1, 'must be 1 to 180 minutes')
    .max(180, 'must be 1 to 180 minutes')
    .default(15)
    .describe(
      'A record tells of an interval that it does not overlap when it lies less than this away, minutes',
    ),
});
export type MastFactsInput = z.output<typeof mastFactsSchema>;

export const newMastSchema = mastFactsSchema.extend({ code });
export const mastChangeSchema = mastFactsSchema.extend({
  isRetired: z.boolean().default(false).describe('Posts of a retired mast are refused; what it told stays'),
});

const ends = 'must be after the beginning';
export const newAssignmentSchema = z
  .object({
    station: z.string('must be text').min(1, 'must be chosen'),
    from: instant,
    to: instant.nullish().describe('Left out: until further notice'),
  })
  .refine(({ from, to }) => !to || to > from, { path: ['to'], message: ends });
export type NewAssignment = z.output<typeof newAssignmentSchema>;
export const assignmentEndSchema = z.object({ to: instant });

export const assignmentSchema = z.object({
  id: z.number().int(),
  mast: z.string(),
  station: z.string(),
  stationName: z.string(),
  from: z.string(),
  to: z.string().nullable(),
  by: z.string().nullable(),
});
export type Assignment = z.output<typeof assignmentSchema>;

const mastSchema = mastFactsSchema.extend({
  code: z.string(),
  maximumAge: z.number(),
  isRetired: z.boolean(),
  last: z
    .object({
      start: z.string(),
      seconds: z.number(),
      windSpeed: z.number(),
      windDirection: z.number().nullable(),
      rain: z.number().nullable(),
      temperature: z.number().nullable(),
    })
    .nullable()
    .describe('The newest record'),
  assignments: z.array(assignmentSchema).describe('Latest first'),
});
export type Mast = z.output<typeof mastSchema>;

/** What became of a file's lines; refused ones by their line, its heading being 1. */
export interface WeatherFileReport extends Pick<Receipt, 'accepted' | 'known'> {
  /** Nothing was stored. */
  isTrial: boolean;
  refused: { line: number; message: string }[];
}

/** A mast's wind of a stretch of time: half-open, epoch seconds. */
export interface WindStep {
  fromSec: number;
  toSec: number;
  /** Null: nothing was recorded. */
  wind: MeanWind | null;
  /** Null: no gauge told. */
  rainMm: number | null;
}

const base = '/api/v1/networks/{network}/masts';
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const network = z.string();
const ofMast = z.object({ network, code: z.string() });

registerRoute({
  access: 'mast',
  method: 'post',
  path: '/api/v1/weather',
  summary: 'A weather mast posts records',
  description:
    'As monitors post intervals: batches, gzip welcome, late and again as it comes; the answer comes once everything accepted is durable. ' +
    'A record with the start of another is known when it says the same, and refused when it differs. Refused records are kept for the operator.',
  request: {
    body: body(
      weatherBatchSchema.extend({ records: z.array(weatherRecordSchema).min(1).max(MOST_WEATHER_RECORDS) }),
    ),
  },
  responses: { 200: answer('What became of each record', receiptSchema) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Weather masts with their newest record and the stations that they are assigned to',
  request: { params: z.object({ network }) },
  responses: { 200: answer('The masts', z.object({ items: z.array(mastSchema) })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Add a mast (operator)',
  request: { params: z.object({ network }), body: body(newMastSchema) },
  responses: {
    201: answer('The mast and its token, shown this once', z.object({ mast: mastSchema, token: z.string() })),
  },
});
registerRoute({
  access: 'person',
  method: 'patch',
  path: `${base}/{code}`,
  summary: 'Change or retire a mast (operator)',
  request: { params: ofMast, body: body(mastChangeSchema) },
  responses: { 200: answer('The mast', z.object({ mast: mastSchema })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{code}/assignments`,
  summary: 'Let a mast tell the weather of a station for a time (operator)',
  request: { params: ofMast, body: body(newAssignmentSchema) },
  responses: { 201: answer('The assignment', z.object({ assignment: assignmentSchema })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/networks/{network}/mast-assignments/{id}/end',
  summary: 'End an assignment, now or at another time (operator)',
  request: { params: z.object({ network, id: z.string() }), body: body(assignmentEndSchema) },
  responses: { 200: answer('The assignment', z.object({ assignment: assignmentSchema })) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{code}/records.csv`,
  summary: 'Weather records of a period, at most 62 days; the same file brought again is all known',
  request: { params: ofMast, query: z.object({ from: z.string(), to: z.string() }) },
  responses: {
    200: {
      description: 'start,seconds,windSpeed,windDirection,rain,temperature',
      content: { 'text/csv': { schema: z.string() } },
    },
  },
});
