import { z } from 'zod';
import { instant, reasonText } from './common';
import { registerRoute } from './registry';

/** Furthest that a stay may begin or end ahead of now: a visit that is planned for tomorrow, not a slip of the year. */
export const MOST_DEPLOYMENT_AHEAD_SEC = 7 * 86_400;

const serialNumber = z
  .string('must be text')
  .trim()
  .min(1, 'must not be empty')
  .max(60, 'must have at most 60 characters');
const words = z.string('must be text').trim().max(160, 'must have at most 160 characters');
const instrumentClass = z
  .union([z.literal(1), z.literal(2)], 'must be 1 or 2')
  .describe('Class of IEC 61672-1');

export const newInstrumentSchema = z.object({
  serialNumber,
  class: instrumentClass,
  description: words.default('').describe('What it is, without the maker: logging sound level meter'),
  microphone: words.default('').describe('Type and serial number of the microphone'),
});
export type NewInstrument = z.output<typeof newInstrumentSchema>;

/** What is left out stays as it is. */
export const instrumentChangesSchema = z.object({
  serialNumber: serialNumber.optional(),
  class: instrumentClass.optional(),
  description: words.optional(),
  microphone: words.optional(),
  retired: z.boolean('must be true or false').optional(),
  reason: reasonText.optional(),
});
export type InstrumentChanges = z.output<typeof instrumentChangesSchema>;

const note = z.string('must be text').trim().max(500, 'must have at most 500 characters').default('');

export const newDeploymentSchema = z
  .object({
    station: z.string('must be text').max(32),
    from: instant,
    to: instant.nullable().default(null),
    note,
  })
  .superRefine(({ from, to }, context) => {
    if (to !== null && to <= from) {
      context.addIssue({ code: 'custom', path: ['to'], message: 'must be after the beginning' });
    }
  });
export type NewDeployment = z.output<typeof newDeploymentSchema>;

export const deploymentEndSchema = z.object({ to: instant });
export const deploymentWithdrawalSchema = z.object({ reason: reasonText });

const deploymentSchema = z.object({
  id: z.number().int(),
  serialNumber: z.string(),
  station: z.string(),
  from: z.string(),
  to: z.string().nullable().describe('Null while it stands there'),
  note: z.string(),
  createdAt: z.string(),
  createdBy: z.string().nullable().describe('Name of the person'),
  withdrawal: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string() })
    .nullable()
    .describe('Set where it was noted by mistake'),
});
export type Deployment = z.output<typeof deploymentSchema>;

const instrumentSchema = z.object({
  id: z.number().int(),
  serialNumber: z.string(),
  class: instrumentClass,
  description: z.string(),
  microphone: z.string(),
  createdAt: z.string(),
  retiredAt: z.string().nullable(),
  deployment: deploymentSchema.nullable().describe('Where it stands now'),
});
export type Instrument = z.output<typeof instrumentSchema>;

const base = '/api/v1/networks/{network}/instruments';
const network = z.string();
const id = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const instrumentAnswer = (description: string) =>
  answer(description, z.object({ instrument: instrumentSchema }));
const deploymentAnswer = (description: string) =>
  answer(description, z.object({ deployment: deploymentSchema }));

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Instruments of a network by serial number, retired ones too; `…/instruments.csv` as a file',
  request: { params: z.object({ network }) },
  responses: {
    200: answer('All of them', z.object({ items: z.array(instrumentSchema), next: z.null() })),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Add an instrument (operator)',
  request: { params: z.object({ network }), body: body(newInstrumentSchema) },
  responses: { 201: instrumentAnswer('The instrument') },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}`,
  summary: 'An instrument with every stay at a station, latest first',
  request: { params: z.object({ network, id }) },
  responses: {
    200: answer(
      'The instrument and its stays',
      z.object({ instrument: instrumentSchema, deployments: z.array(deploymentSchema) }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'patch',
  path: `${base}/{id}`,
  summary: 'Change an instrument, retire it or bring it back (operator)',
  request: { params: z.object({ network, id }), body: body(instrumentChangesSchema) },
  responses: { 200: instrumentAnswer('The instrument as changed') },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/deployments`,
  summary:
    'Note that an instrument stands at a station (operator); stays of a station or instrument never overlap',
  request: { params: z.object({ network, id }), body: body(newDeploymentSchema) },
  responses: { 201: deploymentAnswer('The stay') },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/deployments/{deployment}/end`,
  summary: 'Say until when an instrument stood at a station (operator)',
  request: { params: z.object({ network, id, deployment: id }), body: body(deploymentEndSchema) },
  responses: { 200: deploymentAnswer('The stay as ended') },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/deployments/{deployment}/withdrawal`,
  summary: 'Withdraw a stay that was noted by mistake (operator); it is kept as withdrawn',
  request: { params: z.object({ network, id, deployment: id }), body: body(deploymentWithdrawalSchema) },
  responses: { 200: deploymentAnswer('The stay as withdrawn') },
});
