import { z } from 'zod';
import { reasonText } from './common';
import { BOUNDS, REFUSAL_CODES } from './intervals';
import { registerRoute } from './registry';

const IMPORT_STATES = [
  'mapping',
  'checking',
  'checked',
  'storing',
  'stored',
  'undoing',
  'undone',
  'redoing',
  'discarding',
  'discarded',
  'failed',
] as const;

/** What a column may be besides a band; `start` may come as `date` and `time` instead. */
export const IMPORT_FIELDS = [
  'start',
  'date',
  'time',
  'seconds',
  'LAeq',
  'LAFmax',
  'LAFmin',
  'LCeq',
  'LCpeak',
  'flags',
  'windSpeed',
  'windDirection',
  'temperature',
  'battery',
] as const;
export type ImportField = (typeof IMPORT_FIELDS)[number];

const MOST_COLUMNS = 200;
const NOMINAL_HZ = /^\d{1,5}(\.\d)?$/;
const isTarget = (text: string) => IMPORT_FIELDS.some((field) => field === text) || NOMINAL_HZ.test(text);

/** What the columns of a file are. The contract's own CSV needs none: it is recognised. */
export const importMappingSchema = z
  .object({
    delimiter: z.enum([',', ';', '\t'], 'must be a comma, a semicolon or a tabulator'),
    decimal: z.enum(['.', ','], 'must be a point or a comma'),
    headerLine: z.number().int().min(1).max(50).default(1).describe('Line that holds the headings'),
    columns: z
      .array(z.string().refine(isTarget, 'is neither a field nor a nominal frequency').nullable())
      .max(MOST_COLUMNS, `must be at most ${MOST_COLUMNS}`)
      .describe(
        'Beside the headings: a field, a band by its nominal Hz, or null for a column that is left out',
      ),
    dateOrder: z
      .enum(['ymd', 'dmy', 'mdy'])
      .default('ymd')
      .describe('Of times without an offset; RFC 3339 is read whatever it says'),
    zone: z
      .string()
      .max(64)
      .default('UTC')
      .describe('IANA zone of times without an offset, or a clock that never changes: UTC, UTC+1, UTC+05:30'),
    marks: z.enum(['start', 'end']).default('start').describe('Which end of an interval its time names'),
    seconds: z
      .number()
      .int()
      .min(BOUNDS.seconds[0], 'must be at least 1')
      .max(BOUNDS.seconds[1], 'must be at most 3600')
      .nullable()
      .default(null)
      .describe('Length of every interval, for a file without a column of it'),
  })
  .superRefine(({ columns, seconds, delimiter, decimal }, context) => {
    const problem = (path: string, message: string) =>
      context.addIssue({ code: 'custom', path: [path], message });
    const given = columns.filter((column) => column !== null);
    const twice = given.find((column, at) => given.indexOf(column) !== at);
    if (twice !== undefined) problem('columns', `has two columns for ${twice}; one must be left out`);
    const has = (field: ImportField) => given.includes(field);
    if (!has('start') && !(has('date') && has('time'))) {
      problem('columns', 'needs a column for the start, or one for its date and one for its time');
    }
    if (has('start') && (has('date') || has('time'))) {
      problem('columns', 'has the start and a date or time apart; one way is enough');
    }
    if (has('seconds') === (seconds !== null)) {
      problem('seconds', 'must be given unless a column tells it, and only then');
    }
    if (delimiter === decimal) problem('decimal', 'must differ from what separates the columns');
  });
export type ImportMapping = z.output<typeof importMappingSchema>;

/** Why a row is not taken: a refusal's code, or what its local time lacks. */
export const ROW_REASONS = [...REFUSAL_CODES, 'ambiguous-time', 'nonexistent-time'] as const;
export type RowReason = (typeof ROW_REASONS)[number];

const importReportSchema = z.object({
  rows: z.number().int(),
  accepted: z.number().int(),
  known: z.number().int().describe('Identical to what is stored already, or to an earlier row'),
  conflicting: z.number().int().describe('Refused as `conflict`'),
  refused: z.array(
    z.object({
      reason: z.enum(ROW_REASONS),
      count: z.number().int(),
      examples: z.array(z.object({ line: z.number().int(), detail: z.string() })),
    }),
  ),
  firstStart: z.string().nullable().describe('Of what is accepted'),
  lastStart: z.string().nullable(),
});
export type ImportReport = z.output<typeof importReportSchema>;

export const importSchema = z.object({
  id: z.number().int(),
  station: z.string(),
  state: z.enum(IMPORT_STATES),
  problem: z.string().nullable(),
  fileName: z.string(),
  bytes: z.number().int(),
  bytesDone: z.number().int(),
  mapping: importMappingSchema.nullable(),
  createdAt: z.string(),
  createdBy: z.string().nullable().describe('Name of the person'),
  report: importReportSchema.describe('What the check found so far'),
  stored: z.number().int(),
  knownMeanwhile: z.number().int().describe('Accepted by the check, then stored by somebody else first'),
  refusedMeanwhile: z.number().int(),
  lastAct: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string().nullable() })
    .nullable()
    .describe('Who stored, undid, redid or discarded it last'),
  finishedAt: z.string().nullable(),
});
export type Import = z.output<typeof importSchema>;

export const importActSchema = z
  .object({
    act: z.enum(['store', 'undo', 'redo', 'discard']),
    reason: reasonText.nullable().optional().describe('Needed to undo'),
  })
  .refine(({ act, reason }) => act !== 'undo' || Boolean(reason), {
    message: 'say why it is undone',
    path: ['reason'],
  });
export type ImportAct = z.output<typeof importActSchema>['act'];

const base = '/api/v1/networks/{network}/imports';
const network = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const one = z.object({ import: importSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Imports of files, latest first',
  request: {
    params: z.object({ network }),
    query: z.object({
      station: z.string().optional(),
      limit: z.string().optional(),
      cursor: z.string().optional(),
    }),
  },
  responses: {
    200: answer(
      'A page of the list',
      z.object({ items: z.array(importSchema), next: z.string().nullable() }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Upload a CSV file of intervals for a station (operator); nothing is stored before you say so',
  description:
    'A file in the columns that `…/intervals.csv` writes is checked at once; any other waits for its mapping. The check says ' +
    'what would be accepted, known, conflicting or refused. Gzip is recognised by its first bytes; the limit of size holds for ' +
    'what it unpacks to. For a large file or a poor line see `…/imports/uploads`.',
  request: {
    params: z.object({ network }),
    query: z.object({ station: z.string(), name: z.string().optional().describe('What the file is called') }),
    body: { content: { 'text/csv': { schema: z.string() } } },
  },
  responses: { 201: answer('The import', one) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}`,
  summary: 'One import: its state, how far it is, what the check found',
  request: { params: z.object({ network, id: z.string() }) },
  responses: { 200: answer('The import', one) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/{id}/mapping`,
  summary: 'Say what the columns are and have the file checked (operator)',
  request: { params: z.object({ network, id: z.string() }), body: body(importMappingSchema) },
  responses: { 200: answer('The import', one) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/acts`,
  summary: 'Store what the check accepted, undo that, redo it, or discard the file (operator)',
  description:
    'The worker does it in parts and goes on after a crash; look at the import’s state. Undoing takes out exactly the ' +
    'intervals that the import added; a redo is refused where other intervals have taken their place.',
  request: { params: z.object({ network, id: z.string() }), body: body(importActSchema) },
  responses: { 202: answer('The import', one) },
});
