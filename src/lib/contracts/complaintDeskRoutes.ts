import { z } from 'zod';
import { noteSchema } from './complaintDesk';
import { registerRoute } from './registry';

const personSchema = z.object({ id: z.string(), name: z.string() });

export const assignmentSchema = z.object({
  assignedTo: personSchema.nullable().describe('null: nobody in particular'),
  people: z.array(personSchema).describe('Whom it can be given to'),
});
export type Assignment = z.output<typeof assignmentSchema>;

export const newAssignmentSchema = z.object({
  to: z.string().max(36).nullable().describe('Id of one of the people, or null for nobody in particular'),
});

const deskNotesSchema = z.object({
  items: z
    .array(z.object({ id: z.number().int(), text: z.string(), author: z.string(), at: z.string() }))
    .describe('Oldest first; none once the personal data have been erased'),
  withdrawn: z.array(z.number().int()).describe('Numbers of notes that can be put back'),
});
export type DeskNotes = z.output<typeof deskNotesSchema>;

export const newNoteSchema = z.object({ text: noteSchema });
export const noteWithdrawalSchema = z.object({
  isWithdrawn: z.boolean().describe('false puts it back'),
});

export const mergeSchema = z.object({
  into: z.string().max(40).nullable().describe('Reference of the complaint that it repeats; null undoes it'),
});
const mergedSchema = z.object({ mergedInto: z.string().nullable() });

const params = z.object({ network: z.string(), reference: z.string() });
const base = '/api/v1/networks/{network}/complaints/{reference}';
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });

registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/assignment`,
  summary: 'Who answers a complaint, and who could (liaison)',
  request: { params },
  responses: { 200: answer('The assignment', assignmentSchema) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/assignment`,
  summary: 'Give a complaint to a person who answers in the network, or to nobody in particular (liaison)',
  request: { params, body: body(newAssignmentSchema) },
  responses: { 200: answer('The assignment', assignmentSchema) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/notes`,
  summary: 'Internal notes on a complaint (liaison); every look is audited',
  request: { params },
  responses: { 200: answer('The notes that stand', deskNotesSchema) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/notes`,
  summary: 'Keep an internal note, sealed with the personal data (liaison)',
  request: { params, body: body(newNoteSchema) },
  responses: { 201: answer('The note’s number', z.object({ id: z.number().int() })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/notes/{id}/withdrawal`,
  summary: 'Withdraw an internal note, or put a withdrawn one back (liaison)',
  request: { params: params.extend({ id: z.string() }), body: body(noteWithdrawalSchema) },
  responses: { 200: answer('How it stands now', noteWithdrawalSchema) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/merge`,
  summary: 'Close a complaint as the repeat of another one, or undo that (liaison)',
  request: { params, body: body(mergeSchema) },
  responses: { 200: answer('What it repeats now', mergedSchema) },
});
