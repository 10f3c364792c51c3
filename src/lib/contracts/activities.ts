import { z } from 'zod';
import { instant, reasonText } from './common';
import { registerRoute } from './registry';

/** Kinds that are suggested; a site may use words of its own. */
export const SUGGESTED_ACTIVITIES = ['ship at berth', 'shift', 'blast', 'rail move'] as const;
/** Longest activity, in days: a longer one is more likely a slip. */
const MOST_ACTIVITY_DAYS = 62;
/** Longest period of a comparison, in days. */
export const MOST_COMPARED_DAYS = 93;
/** Activities in one file. */
export const MOST_ACTIVITY_LINES = 5000;

export const newActivitySchema = z
  .object({
    kind: z
      .string('must be text')
      .trim()
      .min(1, 'must not be empty')
      .max(60, 'must have at most 60 characters')
      .describe('What the site did, in its own words: ship at berth'),
    place: z.string('must be text').trim().max(80, 'must have at most 80 characters').default(''),
    from: instant,
    to: instant,
    note: z.string('must be text').trim().max(500, 'must have at most 500 characters').default(''),
  })
  .superRefine(({ from, to }, context) => {
    if (to <= from)
      context.addIssue({ code: 'custom', path: ['to'], message: 'must be after the beginning' });
    else if (to - from > MOST_ACTIVITY_DAYS * 86_400) {
      const message = `must be at most ${MOST_ACTIVITY_DAYS} days after the beginning`;
      context.addIssue({ code: 'custom', path: ['to'], message });
    }
  });
export type NewActivity = z.output<typeof newActivitySchema>;

export const activityWithdrawalSchema = z.object({ reason: reasonText });

const activitySchema = z.object({
  id: z.number().int(),
  kind: z.string(),
  place: z.string(),
  from: z.string(),
  to: z.string(),
  note: z.string(),
  createdAt: z.string(),
  createdBy: z.string().nullable().describe('Name of the person'),
  withdrawal: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string() })
    .nullable()
    .describe('Null while it stands'),
});
export type Activity = z.output<typeof activitySchema>;

const activityFileReportSchema = z.object({
  added: z.number().int(),
  known: z.number().int().describe('Noted before with the same kind, place and times'),
  refused: z.array(z.object({ line: z.number().int(), message: z.string() })),
});
export type ActivityFileReport = z.output<typeof activityFileReportSchema>;

const level = (description: string) => z.number().nullable().describe(`${description}, dB`);
const setSchema = z.object({
  quarterHours: z.number().int(),
  occasions: z.number().int().describe('Unbroken stretches of them, of a day at most'),
  mean: level('Arithmetic mean of the quarter-hours’ LAeq'),
  spread: level('Standard deviation of them'),
});
const activityComparisonSchema = z.object({
  kind: z.string(),
  station: z.string(),
  from: z.string(),
  to: z.string(),
  minimumCoverage: z.number().describe('Of each quarter-hour that counts'),
  on: setSchema.describe('Quarter-hours wholly within the activity'),
  off: setSchema.describe('Quarter-hours without it, at the hours of the day at which it also occurs'),
  leftOut: z.object({
    partly: z.number().int().describe('Quarter-hours that the activity covers in part'),
    uncovered: z.number().int().describe('Without enough valid data'),
    otherHours: z.number().int().describe('Without the activity, at hours at which it never occurs'),
  }),
  difference: level('On less off'),
  expandedUncertainty: level('U = 2u of the difference; null with fewer than five occasions on either side'),
  caution: z.string(),
  bands: z.array(
    z.object({
      nominalHz: z.number(),
      on: level('Mean of the quarter-hours’ Leq with the activity'),
      off: level('Without it'),
      difference: level('On less off'),
      expandedUncertainty: level('U = 2u'),
    }),
  ),
});
export type ActivityComparison = z.output<typeof activityComparisonSchema>;

const base = '/api/v1/networks/{network}/activities';
const network = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const one = z.object({ activity: activitySchema });
const listed = z.object({
  from: z.string().optional(),
  to: z.string().optional(),
  kind: z.string().optional(),
  limit: z.string().optional(),
  cursor: z.string().optional(),
});

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Operations log: what the site did in a period, withdrawn entries too, latest first',
  request: { params: z.object({ network }), query: listed },
  responses: {
    200: answer('A page', z.object({ items: z.array(activitySchema), next: z.string().nullable() })),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Note what the site did (operator)',
  request: { params: z.object({ network }), body: body(newActivitySchema) },
  responses: { 201: answer('The entry', one) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}.csv`,
  summary: 'The standing entries of a period as a file; the same file sent again is all known',
  request: { params: z.object({ network }), query: listed.pick({ from: true, to: true, kind: true }) },
  responses: {
    200: { description: 'kind,place,from,to,note', content: { 'text/csv': { schema: z.string() } } },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}.csv`,
  summary: `Note what a file tells (operator): text/csv with kind,from,to and optionally place,note; at most ${MOST_ACTIVITY_LINES} lines`,
  request: { params: z.object({ network }), body: { content: { 'text/csv': { schema: z.string() } } } },
  responses: { 200: answer('What became of its lines', activityFileReportSchema) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/withdrawal`,
  summary: 'Withdraw an entry noted by mistake (operator); it is kept as withdrawn',
  request: { params: z.object({ network, id: z.string() }), body: body(activityWithdrawalSchema) },
  responses: { 200: answer('The entry as withdrawn', one) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/activity-comparison',
  summary: 'Levels and spectrum of quarter-hours with and without a kind of activity',
  request: {
    params: z.object({ network, code: z.string() }),
    query: z.object({ kind: z.string(), from: z.string(), to: z.string() }),
  },
  responses: { 200: answer('The comparison', activityComparisonSchema) },
});
