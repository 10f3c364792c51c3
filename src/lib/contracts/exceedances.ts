import { z } from 'zod';
import { exceedanceDetailPartSchema } from './exceedanceDetail';
import { LIMIT_UNITS } from './limitMetrics';
import { registerRoute } from './registry';

/** What made the noise, from a list; own words go beside it. */
export const CAUSES = [
  'plant',
  'loading',
  'building-works',
  'vehicles',
  'rail',
  'vessels',
  'aircraft',
  'people',
  'weather',
  'animals',
  'instrument',
  'not-found',
  'other',
] as const;
export type Cause = (typeof CAUSES)[number];

export const EXCEEDANCE_STATES = ['standing', 'lifted'] as const;
export type ExceedanceState = (typeof EXCEEDANCE_STATES)[number];

const tenths = (description: string) => z.number().describe(`${description}, dB to tenths`);

const acknowledgementSchema = z.object({
  at: z.string(),
  by: z.string().nullable().describe('Name of the person'),
  cause: z.enum(CAUSES).nullable(),
  causeDetail: z.string().nullable().describe('The cause in own words'),
  note: z.string(),
  isOutdated: z.boolean().describe('What was found has changed since'),
});
export type Acknowledgement = z.output<typeof acknowledgementSchema>;

const exceedanceSchema = z.object({
  id: z.number().int(),
  station: z.string().describe('Code'),
  stationName: z.string(),
  limit: z.object({
    id: z.number().int(),
    version: z.number().int().describe('The version that it is judged by'),
    name: z.string(),
  }),
  unit: z.enum(LIMIT_UNITS).describe('Of level, threshold and excess'),
  descriptor: z.string().describe('What is compared, in words: "LAeq,15 min"'),
  from: z.string(),
  to: z.string(),
  loudest: z
    .object({ from: z.string(), to: z.string() })
    .nullable()
    .describe(
      'Of rolling windows, which make one exceedance where they follow one another: the loudest, whose the level is',
    ),
  level: tenths(
    'Level of the window, rounded half up as it was compared; of a lifted one without coverage, as it was found',
  ),
  threshold: tenths('The limit'),
  excess: tenths('Level above the limit; not above 0: it was lifted'),
  coverage: z.number().describe('Valid seconds over the seconds of the window'),
  state: z
    .enum(EXCEEDANCE_STATES)
    .describe('lifted: later data, an exclusion or a changed limit took it away; it is kept'),
  revision: z.number().int().describe('How often what was found has changed'),
  detectedAt: z.string(),
  revisedAt: z.string().nullable(),
  acknowledgement: acknowledgementSchema.nullable(),
  version: z.string().describe('Opaque: changes with what was found and with the acknowledgement'),
});
export type Exceedance = z.output<typeof exceedanceSchema>;

const exceedanceDetailSchema = exceedanceSchema.extend(exceedanceDetailPartSchema.shape);
export type ExceedanceDetail = z.output<typeof exceedanceDetailSchema>;

export const newAcknowledgementSchema = z.object({
  note: z
    .string('must be a text')
    .trim()
    .min(1, 'must not be empty')
    .max(2000, 'must have at most 2000 characters')
    .transform((text) => text.replaceAll('\r\n', '\n')),
  cause: z.enum(CAUSES, 'must be one of the list').nullable().default(null),
  causeDetail: z
    .string('must be a text')
    .trim()
    .max(160, 'must have at most 160 characters')
    .transform((text) => (text === '' ? null : text))
    .nullable()
    .default(null),
  version: z
    .string()
    .max(60)
    .nullable()
    .default(null)
    .describe('`version` of the exceedance as it was read; refused with 409 when it is another by now'),
});
export type NewAcknowledgement = z.output<typeof newAcknowledgementSchema>;

const base = '/api/v1/networks/{network}/exceedances';
const network = z.string();
const id = z.string();
const filters = {
  from: z.string().optional().describe('Windows that overlap from here on'),
  to: z.string().optional(),
  station: z.string().optional().describe('Code'),
  limitId: z.string().optional().describe('Number of a limit; `limit` is the size of a page'),
  state: z.enum(EXCEEDANCE_STATES).optional(),
  acknowledged: z.enum(['yes', 'no']).optional(),
};
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Exceedances, latest window first; lifted ones too',
  request: {
    params: z.object({ network }),
    query: z.object({ ...filters, limit: z.string().optional(), cursor: z.string().optional() }),
  },
  responses: {
    200: answer(
      'A page of the list',
      z.object({ items: z.array(exceedanceSchema), next: z.string().nullable() }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}.csv`,
  summary: 'The same list as one CSV file',
  request: { params: z.object({ network }), query: z.object(filters) },
  responses: { 200: { description: 'The file', content: { 'text/csv': { schema: z.string() } } } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}`,
  summary:
    'An exceedance with its limit, spectrum, weather, neighbours, messages and revisions; recipients for operators only',
  request: { params: z.object({ network, id }) },
  responses: { 200: answer('The exceedance', z.object({ exceedance: exceedanceDetailSchema })) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}/events.csv`,
  summary: 'The events of the window, of an exceedance of a limit on events; 404 for any other',
  request: { params: z.object({ network, id }) },
  responses: { 200: { description: 'The file', content: { 'text/csv': { schema: z.string() } } } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/acknowledgement`,
  summary: 'Acknowledge an exceedance, or change the acknowledgement (operator); the audit trail keeps both',
  request: {
    params: z.object({ network, id }),
    body: { content: { 'application/json': { schema: newAcknowledgementSchema } } },
  },
  responses: {
    200: answer('The exceedance as acknowledged', z.object({ exceedance: exceedanceSchema })),
  },
});
