import { z } from 'zod';
import { secondsSchema } from './levels';
import { periodInstrumentsSchema } from './periodInstruments';
import { limitVersionSchema } from './limits';
import { windSourcesSchema } from './windSource';

const level = (description: string) =>
  z.number().nullable().describe(`${description}, dB; null where nothing contributes`);

const STANDING_OUT_REASONS = ['tone', 'tone-on-edge', 'above-neighbours', 'above-usual'] as const;

const bandSchema = z.object({
  nominalHz: z.number(),
  Leq: level('Unweighted level of the window'),
  usual: level('Median of the weeks before'),
  usualLow: level('10 % point'),
  usualHigh: level('90 % point'),
  isStandingOut: z.boolean().describe('Among its neighbours; above usual alone does not count'),
});
export type ComparedBand = z.output<typeof bandSchema>;

const rangeSchema = z.object({
  fromHz: z.number().describe('Lower edge: bands tell a range, not a frequency'),
  toHz: z.number(),
  reasons: z.array(z.enum(STANDING_OUT_REASONS)),
  words: z.string(),
  level: z.number(),
  excessOverNeighbours: z.number().nullable(),
  excessOverUsual: z.number().nullable(),
  aShare: z.number().describe('Part of the A-weighted energy of the spectrum, 0–1'),
});

const conditionsSchema = z.object({
  seconds: z.number().int().describe('Of the intervals measured in the window'),
  wind: z
    .object({
      mean: z.number(),
      maximum: z.number(),
      bound: z.number().describe('Above it an interval does not count'),
      secondsAbove: z.number(),
    })
    .nullable()
    .describe('m/s; null where no interval tells the wind'),
  temperature: z.object({ minimum: z.number(), maximum: z.number() }).nullable().describe('°C'),
  flags: z.array(z.object({ flag: z.string(), seconds: z.number() })),
  secondsLate: z.number().describe('Of intervals that arrived more than an hour after their end'),
  exclusions: z.array(z.object({ from: z.string(), to: z.string(), reason: z.string() })),
});
export type Conditions = z.output<typeof conditionsSchema>;

const neighbourSchema = z.object({
  station: z.string(),
  name: z.string(),
  distanceM: z.number(),
  LAeq: level('In the same window'),
  LAFmax: level('In the same window'),
  coverage: z.number(),
  meetsMinimum: z.boolean(),
});
export type Neighbour = z.output<typeof neighbourSchema>;

/** Events that a window lists; all of them are counted. */
export const MOST_LISTED_EVENTS = 1000;

const eventSchema = z.object({
  from: z.string(),
  to: z.string(),
  seconds: z.number().int().describe('From its first to its last interval above, bridged gaps included'),
  LAE: level('Exposure, re 1 s'),
  LAFmax: level('Highest LAFmax'),
  LAeq: level('Over its valid time'),
});
const eventsSchema = z.object({
  count: z.number().int(),
  items: z.array(eventSchema).describe(`In order of time, at most ${MOST_LISTED_EVENTS}`),
});
export type WindowEvents = z.output<typeof eventsSchema>;

const limitWindSchema = z.object({
  meanSpeed: z.number().nullable().describe('Over all that was measured with a known wind, m/s'),
  secondsMeasured: z.number().describe('Of all intervals, whether they count or not'),
  secondsKnown: z.number().describe('Of these with a known wind speed'),
  secondsWithin: z.number().describe('With a wind that the limit’s rule has count'),
  secondsOutside: z.number(),
  secondsUnknown: z.number().describe('With a speed or direction that the rule asks for and nobody tells'),
});
export type LimitWind = z.output<typeof limitWindSchema>;

const mailSchema = z.object({
  createdAt: z.string(),
  state: z.enum(['waiting', 'sent', 'dead']),
  sentAt: z.string().nullable(),
  attempts: z.number().int(),
  recipient: z.string().nullable().optional().describe('For operators only: addresses are personal data'),
  lastError: z.string().nullable().optional().describe('For operators only'),
});
export type ExceedanceMail = z.output<typeof mailSchema>;

const revisionSchema = z.object({
  revision: z.number().int().describe('0: as it was found'),
  at: z.string(),
  state: z.enum(['standing', 'lifted']),
  level: z.number(),
  threshold: z.number(),
  coverage: z.number(),
  limitVersion: z.number().int(),
});
export type ExceedanceRevision = z.output<typeof revisionSchema>;

/** What the detail of an exceedance has beyond the list. Levels of the window are those of the data as they are now. */
export const exceedanceDetailPartSchema = z.object({
  timeZone: z.string(),
  limitThen: limitVersionSchema.describe('The version that it is judged by'),
  limitNow: z.object({ version: z.number().int(), state: z.enum(['in-force', 'upcoming', 'withdrawn']) }),
  figures: z.object({
    seconds: secondsSchema,
    coverage: z.number(),
    meetsMinimum: z.boolean(),
    sampleSeconds: z.number().int().nullable(),
    LAeq: level('A-weighted equivalent level'),
    LAFmax: level('Highest LAFmax'),
    LA10: level('Exceeded 10 % of the time'),
    LA90: level('Exceeded 90 % of the time'),
  }),
  usual: z
    .object({
      weeks: z.number().int(),
      validWeeks: z.number().int(),
      median: level('LAeq'),
      low: level('10 % point'),
      high: level('90 % point'),
    })
    .describe('The same weekday and clock window in the weeks before'),
  bandFraction: z.union([z.literal(1), z.literal(3)]),
  bands: z.array(bandSchema),
  standingOut: z.array(rangeSchema).describe('Most telling first'),
  tonality: z
    .enum(['assessed', 'octave-bands', 'no-neighbours', 'averaged-too-short', 'no-data'])
    .describe('Whether the mean spectrum could be examined for tones'),
  conditions: conditionsSchema,
  limitWind: limitWindSchema
    .nullable()
    .describe('The wind of the window by the limit’s own rule; null: it has none'),
  events: eventsSchema.nullable().describe('Of a limit on events, as it has them; null: of another limit'),
  instruments: periodInstrumentsSchema,
  wind: windSourcesSchema,
  neighbours: z.array(neighbourSchema).describe('Nearest first'),
  mails: z.array(mailSchema),
  revisions: z.array(revisionSchema).describe('Oldest first'),
});
export type ExceedanceDetailPart = z.output<typeof exceedanceDetailPartSchema>;
