import { z } from 'zod';
import { localDate } from './common';
import { LIMIT_UNITS } from './limitMetrics';
import { registerRoute } from './registry';

/** A calendar month, `2026-03`. */
export const month = z.string().regex(/^(19|20|21)\d{2}-(0[1-9]|1[0-2])$/, 'must be a month such as 2026-03');

/** Formats that a month comes in. */
export const SUMMARY_FORMATS = ['pdf', 'xlsx', 'csv', 'json'] as const;
export type SummaryFormat = (typeof SUMMARY_FORMATS)[number];

const level = (description: string) =>
  z.number().nullable().describe(`${description}, dB, unrounded; null where nothing contributes`);
const exceedanceLevel = (description: string) =>
  z.number().nullable().describe(`${description}, dB; null with too few samples or mixed sample lengths`);

const coverageSchema = z.object({
  coverage: z.number().describe('Valid seconds over the seconds that have elapsed'),
  meetsMinimum: z.boolean(),
});
export type Coverage = z.output<typeof coverageSchema>;

const periodLevels = {
  Lday: level('Level of the day'),
  Levening: level('Level of the evening; null in a network without evening'),
  Lnight: level('Level of the night, which belongs to the date on which it begins'),
  Lden: level('Day-evening-night level'),
};

const periodCoverages = z.object({
  day: coverageSchema,
  evening: coverageSchema.nullable(),
  night: coverageSchema,
  whole: coverageSchema.describe('Of all of them, for Lden; meets the minimum where each of them does'),
});

export const monthFiguresSchema = z.object({
  ...periodLevels,
  LAeq: level('Equivalent level of the calendar month'),
  LA10: exceedanceLevel('Exceeded 10 % of the valid time'),
  LA50: exceedanceLevel('Exceeded 50 % of the valid time'),
  LA90: exceedanceLevel('Exceeded 90 % of the valid time'),
  LAFmax: level('Highest LAFmax'),
  LAFmaxAt: z.string().nullable().describe('Start of the interval that has it'),
  sampleSeconds: z.number().int().nullable().describe('Base samples of the L_N; null when mixed or none'),
  ...coverageSchema.shape,
  periods: periodCoverages,
});
export type MonthLevels = z.output<typeof monthFiguresSchema>;

export const summaryBandSchema = z.object({
  nominalHz: z.number(),
  Leq: level('Unweighted equivalent level of the month'),
  L10: exceedanceLevel('Of the samples of the band'),
  L50: exceedanceLevel('Of the samples of the band'),
  L90: exceedanceLevel('Of the samples of the band'),
});
export type SummaryBand = z.output<typeof summaryBandSchema>;

export const summaryDaySchema = z.object({
  date: localDate,
  ...periodLevels,
  periods: periodCoverages,
});
export type SummaryDay = z.output<typeof summaryDaySchema>;

export const summaryExceedanceSchema = z.object({
  id: z.number().int(),
  limit: z.string(),
  metric: z.string().describe('Such as LAeq,1 h'),
  from: z.string(),
  to: z.string(),
  level: z.number(),
  threshold: z.number(),
  unit: z.enum(LIMIT_UNITS).describe('Of level and threshold'),
  coverage: z.number(),
  state: z.enum(['standing', 'lifted']).describe('lifted: later data or an exclusion took it below'),
});
export type SummaryExceedance = z.output<typeof summaryExceedanceSchema>;

/** Settings of the network that the figures follow, from an instant on. */
export const conventionSchema = z.object({
  from: z.string().nullable().describe('Null: since before the month'),
  timeZone: z.string(),
  day: z.string().describe('Local clock time at which the day begins'),
  evening: z.string().nullable(),
  night: z.string(),
  minimumCoverage: z.number(),
  maximumWindSpeed: z.number().describe('m/s; windier intervals are left out'),
  excludeRain: z.boolean(),
});
export type Convention = z.output<typeof conventionSchema>;

/** States of a month: `open` and `closed` before anybody drafts it. */
const MONTH_STATES = ['open', 'closed', 'draft', 'review', 'issuing', 'issued'] as const;
export type MonthState = (typeof MONTH_STATES)[number];

const summaryMonthSchema = z.object({
  month,
  isToDate: z.boolean(),
  stations: z.array(z.object({ code: z.string(), coverage: z.number() })),
  formats: z.array(z.enum(SUMMARY_FORMATS)),
  state: z
    .enum(MONTH_STATES)
    .describe(
      'open: not over; closed: not drafted yet; else of the latest revision. Files are of the latest issued one',
    ),
  revision: z.number().int().nullable().describe('Latest issued; null: none, files are a draft'),
  issuedAt: z.string().nullable(),
  issuedBy: z.string().nullable(),
  revisions: z
    .array(z.number().int())
    .describe('Issued ones, latest first; all but the first are superseded'),
  hasProposal: z.boolean().describe('Figures have changed since; a revision waits for a decision'),
});
export type SummaryMonth = z.output<typeof summaryMonthSchema>;

const base = '/api/v1/networks/{network}/summaries';

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Months that have data, latest first',
  request: {
    params: z.object({ network: z.string() }),
    query: z.object({
      from: z.string().optional().describe('Months that end after this instant'),
      to: z.string().optional().describe('Months that begin before this instant'),
      limit: z.string().optional(),
      cursor: z.string().optional(),
    }),
  },
  responses: {
    200: {
      description: 'A page of the list',
      content: {
        'application/json': {
          schema: z.object({ items: z.array(summaryMonthSchema), next: z.string().nullable() }),
        },
      },
    },
  },
});
