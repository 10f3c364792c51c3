import { z } from 'zod';
import { monthDocumentSchema } from './monthDocument';
import { registerRoute } from './registry';
import {
  monthActSchema,
  monthLifeSchema,
  newCommentSchema,
  proposalDecisionSchema,
  summaryCheckSchema,
  summaryCommentSchema,
} from './summaryLife';
import { summaryManifestSchema } from './summaryManifest';
import { summaryKeySchema } from './summaryVerification';

/** A draft says that it is one; a sealed file is the document alone. */
const monthFileSchema = monthDocumentSchema.extend({ status: z.literal('draft').optional() });

const network = '/api/v1/networks/{network}';
const month = `${network}/summaries/{month}`;
const params = z.object({ network: z.string(), month: z.string().describe('Such as 2026-03') });
const body = (schema: z.ZodType) => ({ body: { content: { 'application/json': { schema } } } });
const answers = (description: string, schema: z.ZodType) => ({
  200: { description, content: { 'application/json': { schema } } },
});

registerRoute({
  access: 'person',
  method: 'get',
  path: `${month}/revisions`,
  summary: 'What was issued of a month, what is being made, what is proposed',
  request: { params },
  responses: answers('Latest first', monthLifeSchema),
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${month}/acts`,
  summary:
    'Draft, submit, return, discard or issue a month; issuing is done by the worker, look at its revisions',
  request: { params, ...body(monthActSchema) },
  responses: answers('How it stands now', monthLifeSchema),
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${month}/checks`,
  summary: 'What stands open in a month',
  request: { params },
  responses: answers('Each check', z.object({ items: z.array(summaryCheckSchema) })),
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${month}/comments`,
  summary: 'What operators say about a month',
  request: { params },
  responses: answers('Oldest first', z.object({ items: z.array(summaryCommentSchema) })),
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${month}/comments`,
  summary: 'Comment on a month',
  request: { params, ...body(newCommentSchema) },
  responses: answers('Oldest first', z.object({ items: z.array(summaryCommentSchema) })),
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${month}/proposals/{id}`,
  summary: 'Accept or dismiss a proposed revision',
  request: { params: params.extend({ id: z.string() }), ...body(proposalDecisionSchema) },
  responses: answers('How it stands now', monthLifeSchema),
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${month}/manifest`,
  summary: 'The manifest of the latest issued revision, read; its signed bytes are the file .manifest.json',
  request: { params, query: z.object({ revision: z.string().optional() }) },
  responses: answers('The manifest', summaryManifestSchema),
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${network}/summary-keys`,
  summary: 'Put a new signing key in the place of the one that signs',
  request: { params: z.object({ network: z.string() }) },
  responses: answers('Public keys', z.object({ items: z.array(summaryKeySchema) })),
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${network}/summaries/{file}`,
  summary: 'A month as PDF, XLSX, CSV or JSON, and the seal of an issued one',
  request: {
    params: z.object({
      network: z.string(),
      file: z
        .string()
        .regex(/^\d{4}-\d{2}\.(pdf|xlsx|csv|json|manifest\.json|manifest\.sig)$/)
        .describe('Such as 2026-03.pdf, or 2026-03.manifest.json and 2026-03.manifest.sig'),
    }),
    query: z.object({
      revision: z
        .string()
        .optional()
        .describe('Without it the latest issued revision, and where there is none the draft as of now'),
    }),
  },
  responses: {
    200: {
      description:
        'The month; CSV is a ZIP of a file a topic, with its description. A draft’s JSON tells so by `status`, which an issued one’s does not have. The signature is 64 bytes, Ed25519.',
      headers: {
        'Bittern-Revision': { description: 'Its revision, or draft', schema: { type: 'string' } },
        'Bittern-Superseded': {
          description: 'The revision that takes its place, where there is one',
          schema: { type: 'string' },
        },
      },
      content: {
        'application/json': { schema: monthFileSchema },
        'application/zip': { schema: z.string() },
        'application/pdf': { schema: z.string() },
        'application/octet-stream': { schema: z.string() },
      },
    },
  },
});
