import { z } from 'zod';
import { instant, reasonText } from './common';
import { REFUSAL_CODES } from './intervals';
import { registerRoute } from './registry';

/** Codes of records in quarantine: a refusal's, or `superseded` for one that a released conflict replaced. */
export const QUARANTINE_CODES = [...REFUSAL_CODES, 'superseded'] as const;
export type QuarantineCode = (typeof QUARANTINE_CODES)[number];

export const QUARANTINE_STATES = ['open', 'released', 'dismissed', 'superseded'] as const;

/** Most records that one act settles; what is left can be asked for again. */
export const MOST_SETTLED = 5000;

export const quarantinedSchema = z.object({
  id: z.number().int(),
  station: z.string(),
  code: z.enum(QUARANTINE_CODES),
  detail: z.string(),
  start: z.string().nullable().describe('As the record claims; null when that could not be read'),
  receivedAt: z.string(),
  timesReceived: z.number().int(),
  importId: z.number().int().nullable().describe('The import that brought it; null: a post'),
  state: z.enum(QUARANTINE_STATES),
  settled: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string().nullable() })
    .nullable()
    .describe('Null while it is open'),
});
export type Quarantined = z.output<typeof quarantinedSchema>;

const quarantinedRecordSchema = quarantinedSchema.extend({
  record: z
    .object({ bands: z.array(z.number()), interval: z.unknown() })
    .describe('As received, with the bands of its post'),
});
export type QuarantinedRecord = z.output<typeof quarantinedRecordSchema>;

const ids = z.array(z.number().int().min(1)).min(1).max(MOST_SETTLED);

const quarantineFilterSchema = z
  .object({
    station: z.string().max(32).optional(),
    code: z.enum(QUARANTINE_CODES, 'is not a code of the quarantine').optional(),
    from: instant.optional(),
    to: instant.optional(),
  })
  .strict();
export type QuarantineFilterAsked = z.output<typeof quarantineFilterSchema>;

/** Which records an act is for: some by id, or all that a filter matches. */
const chosen = {
  ids: ids.optional(),
  filter: quarantineFilterSchema
    .optional()
    .describe('`{}`: every record of the network that it may be done to'),
};
const isChosenOnce = ({ ids: some, filter }: { ids?: unknown; filter?: unknown }) =>
  (some === undefined) !== (filter === undefined);
const CHOOSE = { message: 'give either `ids` or `filter`', path: ['ids'] };

export const releaseSchema = z
  .object({
    ...chosen,
    reason: reasonText.nullable().optional(),
    replace: z
      .boolean()
      .optional()
      .describe(
        'The one record takes the place of the stored interval that it conflicts with; needs a reason',
      ),
  })
  .refine(isChosenOnce, CHOOSE)
  .refine(({ replace, ids: some }) => !replace || some?.length === 1, {
    message: 'replacing is for one record at a time',
    path: ['ids'],
  })
  .refine(({ replace, reason }) => !replace || Boolean(reason), {
    message: 'say why the stored interval gives way',
    path: ['reason'],
  });

export const dismissalSchema = z.object({ ...chosen, reason: reasonText }).refine(isChosenOnce, CHOOSE);
export const reopeningSchema = z.object(chosen).refine(isChosenOnce, CHOOSE);

const releaseOutcomeSchema = z.object({
  released: z.number().int().describe('Stored now'),
  known: z.number().int().describe('Said the same as what is stored; settled as released'),
  refused: z
    .array(z.object({ id: z.number().int(), code: z.enum(REFUSAL_CODES), detail: z.string() }))
    .describe('Still refused and still open; why, as of now. At most 100 are listed'),
  refusedCount: z.number().int(),
  passedOver: z.number().int().describe('Not there, or not in a state to be released'),
  isMoreLeft: z.boolean().describe(`More than ${MOST_SETTLED} matched: ask again for the others`),
});
export type ReleaseOutcome = z.output<typeof releaseOutcomeSchema>;

const settledOutcomeSchema = z.object({
  settled: z.number().int(),
  passedOver: z.number().int().describe('Not there, or not in a state for it'),
  isMoreLeft: z.boolean(),
});
export type SettledOutcome = z.output<typeof settledOutcomeSchema>;

const base = '/api/v1/networks/{network}/quarantine';
const network = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Refused records that are kept, latest first; open ones unless `state` says otherwise',
  request: {
    params: z.object({ network }),
    query: z.object({
      station: z.string().optional(),
      code: z.enum(QUARANTINE_CODES).optional(),
      state: z.enum([...QUARANTINE_STATES, 'all']).optional(),
      from: z.string().optional().describe('Of the claimed start'),
      to: z.string().optional(),
      limit: z.string().optional(),
      cursor: z.string().optional(),
    }),
  },
  responses: {
    200: answer(
      'A page of the list',
      z.object({ items: z.array(quarantinedSchema), next: z.string().nullable() }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}`,
  summary: 'One refused record as it was received',
  request: { params: z.object({ network, id: z.string() }) },
  responses: { 200: answer('The record', z.object({ record: quarantinedRecordSchema })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/releases`,
  summary:
    'Take refused records as a post would now (operator); with `replace`, in place of the stored interval',
  request: { params: z.object({ network }), body: body(releaseSchema) },
  responses: { 200: answer('What became of them', z.object({ outcome: releaseOutcomeSchema })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/dismissals`,
  summary: 'Settle refused records as not to be taken (operator); they are kept and can be reopened',
  request: { params: z.object({ network }), body: body(dismissalSchema) },
  responses: { 200: answer('How many', z.object({ outcome: settledOutcomeSchema })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/reopenings`,
  summary: 'Undo dismissals (operator)',
  request: { params: z.object({ network }), body: body(reopeningSchema) },
  responses: { 200: answer('How many', z.object({ outcome: settledOutcomeSchema })) },
});
