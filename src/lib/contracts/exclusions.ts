import { z } from 'zod';
import { instant, reasonText } from './common';
import { registerRoute } from './registry';

/** Longest exclusion, in days: a longer one is more likely a slip than a fault. */
const MOST_EXCLUSION_DAYS = 366;

/** Most local dates of a station that a preview shows. */
export const MOST_PREVIEWED_DATES = 31;

function refusePeriod({ from, to }: { from: number; to: number }, context: z.RefinementCtx): void {
  if (to <= from) context.addIssue({ code: 'custom', path: ['to'], message: 'must be after the beginning' });
  if (to - from > MOST_EXCLUSION_DAYS * 86_400) {
    const message = `must be at most ${MOST_EXCLUSION_DAYS} days after the beginning`;
    context.addIssue({ code: 'custom', path: ['to'], message });
  }
}

export const newExclusionSchema = z
  .object({ station: z.string().max(32), from: instant, to: instant, reason: reasonText })
  .superRefine(refusePeriod);
export type NewExclusion = z.output<typeof newExclusionSchema>;

const stations = z
  .array(z.string().max(32), 'must be a list of station codes, or null')
  .min(1, 'must name at least one station')
  .max(500, 'must name at most 500 stations')
  .nullable()
  .describe('Codes; null: every station in service');

export const exclusionPreviewAskedSchema = z
  .object({ stations, from: instant, to: instant })
  .superRefine(refusePeriod);
export type ExclusionPreviewAsked = z.output<typeof exclusionPreviewAskedSchema>;

export const bulkExclusionSchema = z
  .object({ stations, from: instant, to: instant, reason: reasonText })
  .superRefine(refusePeriod);
export type BulkExclusion = z.output<typeof bulkExclusionSchema>;

export const withdrawalSchema = z.object({ reason: reasonText });

const exclusionSchema = z.object({
  id: z.number().int(),
  act: z
    .number()
    .int()
    .nullable()
    .describe('Number that those made at several stations by one act share; null: made alone'),
  station: z.string(),
  from: z.string(),
  to: z.string(),
  reason: z.string(),
  createdAt: z.string(),
  createdBy: z.string().nullable().describe('Name of the person'),
  withdrawal: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string() })
    .nullable()
    .describe('Null while the exclusion stands'),
});
export type Exclusion = z.output<typeof exclusionSchema>;

const level = z.number().nullable().describe('dB, unrounded; null where nothing contributes');

const dateFiguresSchema = z.object({
  LAeq24h: level,
  Lday: level,
  Levening: level,
  Lnight: level,
  Lden: level,
  coverage: z.number().describe('Of the civil day, 0–1'),
  meetsMinimum: z.boolean().describe('Of the civil day'),
  periodsMeetMinimum: z.boolean().describe('Whether day, evening and night all do, which Lden rests on'),
  validSeconds: z.number().describe('Of the civil day'),
});
export type DateFigures = z.output<typeof dateFiguresSchema>;

export const exclusionPreviewSchema = z.object({
  stations: z.array(
    z.object({
      station: z.string(),
      name: z.string(),
      dates: z.array(z.object({ date: z.string(), before: dateFiguresSchema, after: dateFiguresSchema })),
      omittedDates: z
        .number()
        .int()
        .describe(`Dates touched beyond the first ${MOST_PREVIEWED_DATES}, which are not shown`),
    }),
  ),
});
export type ExclusionPreview = z.output<typeof exclusionPreviewSchema>;

const base = '/api/v1/networks/{network}/exclusions';
const network = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });

const filters = {
  from: z.string().optional(),
  to: z.string().optional(),
  station: z.string().optional(),
};

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Exclusions that overlap a period, withdrawn ones too, latest first',
  request: {
    params: z.object({ network }),
    query: z.object({ ...filters, limit: z.string().optional(), cursor: z.string().optional() }),
  },
  responses: {
    200: answer(
      'A page of the list',
      z.object({ items: z.array(exclusionSchema), next: z.string().nullable() }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Exclude a period of a station from statistics (operator); the data stay',
  request: { params: z.object({ network }), body: body(newExclusionSchema) },
  responses: { 201: answer('The exclusion', z.object({ exclusion: exclusionSchema })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/withdrawal`,
  summary:
    'Withdraw an exclusion (operator); its period counts again, and the exclusion is kept as withdrawn',
  request: { params: z.object({ network, id: z.string() }), body: body(withdrawalSchema) },
  responses: { 200: answer('The exclusion as withdrawn', z.object({ exclusion: exclusionSchema })) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}.csv`,
  summary: 'The same list as one CSV file',
  request: { params: z.object({ network }), query: z.object(filters) },
  responses: {
    200: { description: 'The whole list', content: { 'text/csv': { schema: z.string() } } },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/preview`,
  summary:
    'What the figures of the touched dates would become if a period were left out (operator); nothing is stored',
  request: { params: z.object({ network }), body: body(exclusionPreviewAskedSchema) },
  responses: { 200: answer('Figures before and after, by station', exclusionPreviewSchema) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/bulk`,
  summary: 'Exclude a period of several stations from statistics by one act (operator); all of it or nothing',
  request: { params: z.object({ network }), body: body(bulkExclusionSchema) },
  responses: { 201: answer('The exclusions', z.object({ items: z.array(exclusionSchema) })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/acts/{id}/withdrawal`,
  summary: 'Withdraw every exclusion of an act that still stands (operator); they are kept as withdrawn',
  request: { params: z.object({ network, id: z.string() }), body: body(withdrawalSchema) },
  responses: { 200: answer('Those withdrawn by this', z.object({ items: z.array(exclusionSchema) })) },
});
