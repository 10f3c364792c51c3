import { z } from 'zod';
import { secondsSchema } from './levels';
import { monthFiguresSchema, summaryDaySchema } from './summaries';

const level = (description: string) =>
  z.number().nullable().describe(`${description}, dB; null where nothing contributes`);
const exceeded = (percent: number) =>
  z
    .number()
    .nullable()
    .describe(
      `Level exceeded ${percent} % of the valid time, dB; null with too few samples or mixed sample lengths`,
    );
const expanded = (of: string) =>
  z
    .number()
    .nullable()
    .describe(`Expanded uncertainty U = 2u of ${of}, dB; null where it cannot be told or there is no level`);

/** How much of a figure’s own time has valid data. */
const coveredSchema = z.object({
  seconds: secondsSchema,
  coverage: z.number().describe('Valid seconds over the seconds that have elapsed'),
  meetsMinimum: z.boolean(),
});
export type CoveredSeconds = z.output<typeof coveredSchema>;

const uncertaintiesSchema = z.object({
  LAeq: expanded('LAeq'),
  Lday: expanded('Lday'),
  Levening: expanded('Levening'),
  Lnight: expanded('Lnight'),
  Lden: expanded('Lden'),
});
export type Uncertainties = z.output<typeof uncertaintiesSchema>;

/** What the uncertainty of a month’s LAeq is made of. */
const uncertaintyTermsSchema = z.object({
  instrument: z.number().describe('Standard uncertainty of the instrument’s class, dB'),
  basis: z.enum(['class-1', 'class-2', 'class-1-assumed']).describe('assumed: no instrument is on record'),
  drift: z.number().describe('Largest drift that the calibration checks show, dB'),
  driftKnown: z.enum(['both', 'before', 'after', 'none']).describe('On which sides checks enclose the month'),
  gaps: z.number().nullable().describe('Of missing data, assuming that gaps fall at random, dB'),
});
export type UncertaintyTerms = z.output<typeof uncertaintyTermsSchema>;

/** Figures of a station’s month beyond those of its summary. */
export const documentFiguresSchema = monthFiguresSchema.extend({
  seconds: secondsSchema,
  LCeq: level('C-weighted equivalent level of the calendar month'),
  LAFmin: level('Lowest LAFmin'),
  LCpeak: level('Highest LCpeak'),
  LA1: exceeded(1),
  LA5: exceeded(5),
  LA95: exceeded(95),
  LA99: exceeded(99),
  incident: level('LAeq of the incident sound, with the correction of each placement'),
  U: uncertaintiesSchema,
  uncertainty: uncertaintyTermsSchema,
});
export type DocumentFigures = z.output<typeof documentFiguresSchema>;

/** A local date of the month. */
export const documentDaySchema = summaryDaySchema.extend({
  LAeq24h: level('Equivalent level of the civil day'),
  LAFmax: level('Highest LAFmax of the civil day'),
  LA10: exceeded(10),
  LA50: exceeded(50),
  LA90: exceeded(90),
  ...coveredSchema.shape,
  sampleSeconds: z.number().int().nullable(),
  hours: z.number().describe('Length of the civil day; 23 or 25 on a clock change'),
  U: uncertaintiesSchema.describe('LAeq: of LAeq24h'),
});
export type DocumentDay = z.output<typeof documentDaySchema>;

/** From the first date of the year to the end of the month, pooled. */
export const yearToDateSchema = z.object({
  from: z.string(),
  to: z.string(),
  Lday: level('Of the days that begin in it'),
  Levening: level('Of the evenings; null in a network without evening'),
  Lnight: level('Of the nights that begin in it'),
  Lden: level('Of the pooled levels; null where one is missing or the periods of day changed'),
  LAeq: level('By the clock'),
  LA10: exceeded(10),
  LA50: exceeded(50),
  LA90: exceeded(90),
  LAFmax: level('Highest LAFmax'),
  sampleSeconds: z.number().int().nullable(),
  ...coveredSchema.shape,
  U: uncertaintiesSchema
    .nullable()
    .prefault(null)
    .describe('Null in months that were issued before it was told'),
});
export type YearToDate = z.output<typeof yearToDateSchema>;

/** One hour of the clock on the wall. */
export const documentHourSchema = z.object({
  date: z.string(),
  hour: z.number().int(),
  turn: z
    .union([z.literal(0), z.literal(1)])
    .describe('1: the second hour of that name, which the autumn change brings'),
  LAeq: level('Equivalent level'),
  coverage: z.number(),
  meetsMinimum: z.boolean(),
});
export type DocumentHour = z.output<typeof documentHourSchema>;
