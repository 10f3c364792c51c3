import { z } from 'zod';
import { localDate } from './common';
import { periodInstrumentsSchema } from './periodInstruments';
import { registerRoute } from './registry';
import { windSourcesSchema } from './windSource';

const level = (description: string) =>
  z.number().nullable().describe(`${description}, dB; null where nothing contributes`);
const exceedance = (description: string) =>
  z.number().nullable().describe(`${description}, dB; null with too few samples or mixed sample lengths`);

/** The percentages of `LAN`. */
export const EXCEEDANCE_PERCENTS = [1, 5, 10, 50, 90, 95, 99] as const;

export const secondsSchema = z.object({
  expected: z.number().int().describe('Seconds of the period that have elapsed'),
  valid: z.number().int(),
  excluded: z.number().int().describe('Measured, but left out by validity rules or an exclusion'),
});
export type Seconds = z.output<typeof secondsSchema>;

const coverage = z.number().describe('Valid seconds over expected seconds');
const meetsMinimum = z.boolean().describe('Whether coverage reaches the minimum of the network');

const bandSchema = z.object({
  nominalHz: z.number(),
  Leq: level('Unweighted equivalent level'),
  L10: exceedance('Level exceeded 10 % of the valid time'),
  L50: exceedance('Level exceeded 50 % of the valid time'),
  L90: exceedance('Level exceeded 90 % of the valid time'),
});
export type BandStatistics = z.output<typeof bandSchema>;

const toneSchema = z.object({
  lowerHz: z.number().describe('Lower edge: a band tells a range, not a frequency'),
  upperHz: z.number().describe('Upper edge'),
  excess: z.number().describe('dB above the louder neighbouring band'),
  method: z.enum(['survey', 'adjacent-pair']),
});

const tonalitySchema = z
  .object({
    state: z.enum(['assessed', 'octave-bands', 'no-neighbours', 'averaged-too-short', 'no-data']),
    tones: z.array(toneSchema),
  })
  .describe(
    'Tones of the mean spectrum of the period; "assessed" with none is no tone, any other state is not an answer',
  );

/** Figures of one station and period. */
const statisticsSchema = z.object({
  from: z.string(),
  to: z.string(),
  validity: z.enum(['rules', 'all']).describe('"all" includes what validity rules and exclusions leave out'),
  seconds: secondsSchema,
  coverage,
  minimumCoverage: z.number(),
  meetsMinimum,
  LAeq: level('A-weighted equivalent level'),
  LCeq: level('C-weighted equivalent level over the intervals that have one'),
  LAFmax: level('Highest LAFmax'),
  LAFmin: level('Lowest LAFmin'),
  LCpeak: level('Highest LCpeak'),
  LAE: level('Sound exposure level of the valid seconds, re 1 s'),
  LAN: z
    .record(z.string(), exceedance('Level exceeded N % of the valid time'))
    .describe('By N: 1, 5, 10, 50, 90, 95, 99; of the base samples, LAeq of sampleSeconds'),
  bands: z.array(bandSchema).describe('Bands of the station, ascending'),
  octaves: z
    .array(bandSchema)
    .describe('Octaves; of a one-third-octave station the sums of three thirds, null where one is missing'),
  sampleSeconds: z.number().int().nullable().describe('Length of the base samples; null when mixed or none'),
  isSampleMixed: z.boolean().describe('Lengths of base samples differ, so there is no L_N'),
  tonality: tonalitySchema,
  lowFrequency: z
    .object({ difference: z.number(), bound: z.number(), isAbove: z.boolean() })
    .nullable()
    .describe('LCeq − LAeq, a screening'),
  noiseRating: z
    .object({ NR: z.number().int(), governingHz: z.number(), isAtLeast: z.boolean() })
    .nullable()
    .describe('NR of the octave spectrum; meant for rooms. isAtLeast: an octave is missing'),
  note: z
    .string()
    .nullable()
    .describe(
      'Where the period reaches back to where single intervals are no longer kept: what the figures are from. from and to are then whole ' +
        'quarter-hours, and L_N per band may be missing',
    ),
});
export type Statistics = z.output<typeof statisticsSchema>;

export const placementSpanSchema = z.object({
  from: z.string(),
  to: z.string(),
  placement: z.enum(['free-field', 'facade']),
  correction: z
    .number()
    .describe('Added to what was measured, dB: −3 at a façade by default, 0 in the free field'),
});
export type PlacementSpan = z.output<typeof placementSpanSchema>;

/** Level of the sound without a façade's reflection, and how the microphone stood, stretch by stretch. */
const incidentSchema = z.object({
  LAeq: level('A-weighted equivalent level of the incident sound'),
  placements: z.array(placementSpanSchema),
});
export type Incident = z.output<typeof incidentSchema>;

/** What the interface answers of a period: its figures, and what made them. */
const statisticsAnswerSchema = statisticsSchema.extend({
  incident: incidentSchema.describe('Every other figure is as measured'),
  instruments: periodInstrumentsSchema,
  wind: windSourcesSchema,
});

const periodSchema = z.object({
  from: z.string(),
  to: z.string(),
  seconds: secondsSchema,
  coverage,
  meetsMinimum,
});

/** Figures of one local date. */
const daySchema = z.object({
  date: localDate,
  Lday: level('Level of the day'),
  Levening: level('Level of the evening'),
  Lnight: level('Level of the night that begins on this date'),
  Lden: level('Day-evening-night level with the nominal hours'),
  Ldn: level('Day-night level, 07–22 and 22–07 of this date'),
  LAeq24h: level('Level of the civil day'),
  LAFmax: level('Highest LAFmax of the civil day'),
  LA10: exceedance('Of the civil day'),
  LA50: exceedance('Of the civil day'),
  LA90: exceedance('Of the civil day'),
  seconds: secondsSchema,
  coverage,
  meetsMinimum,
  sampleSeconds: z.number().int().nullable(),
  hours: z.number().describe('Length of the civil day; 23 or 25 on a clock change'),
  periods: z.object({ day: periodSchema, evening: periodSchema.nullable(), night: periodSchema }),
});
export type DayFigures = z.output<typeof daySchema>;
export type PeriodCoverage = z.output<typeof periodSchema>;

const daysSchema = z.object({
  timeZone: z.string(),
  minimumCoverage: z.number(),
  days: z.array(daySchema),
});
export type Days = z.output<typeof daysSchema>;

const station = '/api/v1/networks/{network}/stations/{code}';
const params = z.object({ network: z.string(), code: z.string() });
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});

registerRoute({
  access: 'person',
  method: 'get',
  path: `${station}/statistics`,
  summary: 'Figures of a period',
  request: {
    params,
    query: z.object({ from: z.string(), to: z.string(), validity: z.enum(['rules', 'all']).optional() }),
  },
  responses: { 200: answer('The figures, unrounded', statisticsAnswerSchema) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${station}/days`,
  summary: 'Figures of local dates; the night belongs to the date on which it begins',
  request: { params, query: z.object({ from: localDate, to: localDate.describe('Exclusive') }) },
  responses: { 200: answer('One entry a date', daysSchema) },
});
