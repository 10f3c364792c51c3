import { z } from 'zod';
import { COMPLAINT_KINDS, COMPLAINT_SOURCES, COMPLAINT_STATUSES, personalDataSchema } from './complaints';
import { registerRoute } from './registry';

const dated = { at: z.string(), text: z.string() };

const heldComplaintSchema = z.object({
  reference: z.string(),
  from: z.string(),
  to: z.string(),
  kind: z.enum(COMPLAINT_KINDS),
  area: z.string().nullable(),
  nearestStation: z.string().nullable(),
  status: z.enum(COMPLAINT_STATUSES),
  source: z.enum(COMPLAINT_SOURCES),
  loggedAt: z.string(),
  person: personalDataSchema,
  file: z.object({ mediaType: z.string(), base64: z.string() }).nullable(),
  additions: z.array(z.object(dated)),
  replies: z.array(
    z.object({
      ...dated,
      to: z.string().nullable(),
      subject: z.string(),
      pdfBase64: z.string().nullable(),
    }),
  ),
  received: z.array(z.object({ ...dated, from: z.string().nullable(), subject: z.string().nullable() })),
  notes: z.array(z.object({ ...dated, author: z.string() })),
  answerInHand: z.string().nullable().describe('An answer that is being written'),
});
export type HeldComplaint = z.output<typeof heldComplaintSchema>;

/** All that a network holds about a person, for a data request. */
export const personalExportSchema = z.object({
  network: z.string(),
  keeper: z.string().describe('Who keeps it, and how to reach them'),
  madeAt: z.string(),
  keptUntil: z.string().describe('How long it is kept'),
  knownBy: z
    .array(z.enum(['email', 'phone']))
    .describe('By what complaints are known to be of the same person, beside the one that was asked for'),
  complaints: z.array(heldComplaintSchema),
});
export type PersonalExport = z.output<typeof personalExportSchema>;

export const EXPORT_FORMATS = ['json', 'text'] as const;

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/complaints/{reference}/person',
  summary: 'All that is held about the person of a complaint, for a data request (liaison); audited',
  request: {
    params: z.object({ network: z.string(), reference: z.string() }),
    query: z.object({ format: z.enum(EXPORT_FORMATS).optional() }),
  },
  responses: {
    200: {
      description: 'Every complaint of the same contact with everything that is kept of it',
      content: {
        'application/json': { schema: personalExportSchema },
        'text/plain': {},
      },
    },
  },
});
