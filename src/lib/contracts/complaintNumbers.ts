import { z } from 'zod';
import { localDate } from './common';
import { COMPLAINT_KINDS, COMPLAINT_SOURCES } from './complaints';
import { registerRoute } from './registry';

const count = z.number().int();
const shareSchema = z.object({ count, of: count });

/** Numbers of the complaints whose noise began in a period. Repeats of another complaint are counted apart. */
const complaintNumbersSchema = z.object({
  from: z.string(),
  to: z.string(),
  timeZone: z.string(),
  total: count.describe('Without repeats'),
  repeats: count.describe('Same report as another one'),
  byMonth: z.array(z.object({ month: z.string(), count })),
  byKind: z.array(z.object({ kind: z.enum(COMPLAINT_KINDS), count })),
  byArea: z.array(z.object({ area: z.string().nullable().describe('null: none was chosen'), count })),
  byStation: z.array(z.object({ station: z.string().nullable(), count })),
  bySource: z.array(z.object({ source: z.enum(COMPLAINT_SOURCES), count })),
  byHour: z.array(count).describe('24 counts by the civil hour in which the noise began'),
  answers: z.object({
    answered: count,
    medianDays: z
      .number()
      .nullable()
      .describe('From logging to the first answer, days of 24 h; null: none answered'),
    withinDue: shareSchema.describe('Of those answered or past their due date: answered on or before it'),
  }),
  withExceedance: shareSchema.describe('A limit stands exceeded at the nearest station within the window'),
});
export type ComplaintNumbers = z.output<typeof complaintNumbersSchema>;

const spanCountsSchema = z.object({
  from: localDate,
  to: localDate.describe('Exclusive'),
  total: count,
  dates: count.describe('On how many civil dates'),
  withExceedance: count,
});

/** Complaints before and after a measure, over two spans of the same length. */
const measureComparisonSchema = z.object({
  measureOn: localDate,
  days: count.describe('Of each span: what was asked for, or as many as have passed since'),
  isShortened: z.boolean(),
  before: spanCountsSchema,
  after: spanCountsSchema,
  chance: z
    .number()
    .describe('How likely the totals differ at least so much by chance alone, were complaints independent'),
});
export type MeasureComparison = z.output<typeof measureComparisonSchema>;

/** Lengths of the spans before and after a measure, days. */
export const MEASURE_DAYS = [14, 28, 56, 91, 182, 364] as const;

const request = {
  params: z.object({ network: z.string() }),
  query: z.object({
    from: z.string().optional().describe('Civil date; a year ago when left out'),
    to: z.string().optional().describe('Civil date, exclusive'),
    kind: z.enum(COMPLAINT_KINDS).optional(),
    area: z.string().optional(),
    measure: z.string().optional().describe('Civil date of a measure, to be compared before and after'),
    days: z.string().optional(),
  }),
};
const path = '/api/v1/networks/{network}/complaints/numbers';

registerRoute({
  access: 'person',
  method: 'get',
  path,
  summary: 'Numbers of complaints, never with personal data',
  request,
  responses: {
    200: {
      description: 'Counts of the period; before and after a measure where one is named',
      content: {
        'application/json': {
          schema: z.object({
            numbers: complaintNumbersSchema,
            measure: measureComparisonSchema.nullable(),
          }),
        },
      },
    },
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${path}.csv`,
  summary: 'The same as CSV: group, value, count',
  request,
  responses: { 200: { description: 'The counts', content: { 'text/csv': {} } } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/complaints.csv',
  summary: 'The list of complaints as CSV, narrowed as its page is, never with personal data',
  request: {
    params: z.object({ network: z.string() }),
    query: z.object({
      status: z.string().optional(),
      assignee: z.string().optional(),
      kind: z.string().optional(),
      source: z.string().optional(),
      area: z.string().optional(),
      station: z.string().optional(),
      from: z.string().optional(),
      to: z.string().optional(),
      reference: z.string().optional(),
    }),
  },
  responses: { 200: { description: 'By due date', content: { 'text/csv': {} } } },
});
