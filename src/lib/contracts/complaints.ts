import { z } from 'zod';
import { emailAddress, instant, localDate } from './common';
import { evidenceSchema } from './complaintEvidence';
import { packItemsSchema } from './evidencePack';
import { registerRoute } from './registry';

/** What a noise sounds like, from a list; own words are personal data and stand apart. */
export const COMPLAINT_KINDS = [
  'hum',
  'whine',
  'bang',
  'rumble',
  'music',
  'traffic',
  'alarm',
  'other',
] as const;
export type ComplaintKind = (typeof COMPLAINT_KINDS)[number];

/** What a noise did to the person who reports it: health, so it is personal. */
export const COMPLAINT_EFFECTS = ['woken', 'no-sleep', 'windows-shut', 'no-rest', 'unwell', 'other'] as const;
export type ComplaintEffect = (typeof COMPLAINT_EFFECTS)[number];

/** Who wrote a complaint down: the liaison at the desk, or the resident on the public form. */
export const COMPLAINT_SOURCES = ['desk', 'resident'] as const;
export type ComplaintSource = (typeof COMPLAINT_SOURCES)[number];

export const COMPLAINT_STATUSES = ['open', 'answered', 'closed'] as const;
export type ComplaintStatus = (typeof COMPLAINT_STATUSES)[number];

/** Why a complaint is closed without a reply; a list, because own words could name somebody. */
export const CLOSING_REASONS = ['no-contact', 'withdrawn', 'repeated', 'not-ours', 'erased'] as const;
export type ClosingReason = (typeof CLOSING_REASONS)[number];

/** Longest window that a complaint may name, in days: the weeks before are compared with it clock for clock. */
export const MOST_WINDOW_DAYS = 7;

const personalText = (most: number) =>
  z
    .string()
    .trim()
    .max(most, `must have at most ${most} characters`)
    .transform((text) => (text === '' ? null : text))
    .nullable()
    .default(null);

export const contactSchema = z.object({
  name: personalText(160),
  email: z
    .union([z.literal('').transform(() => null), emailAddress], { error: 'must be an e-mail address' })
    .nullable()
    .default(null),
  phone: personalText(60),
  address: personalText(300),
});
export type Contact = z.output<typeof contactSchema>;

const degrees = (most: number) =>
  z
    .number({ error: 'must be a number of degrees such as 54.1031' })
    .min(-most, `must be from −${most} to ${most}`)
    .max(most, `must be from −${most} to ${most}`);
const latitude = degrees(90);
const longitude = degrees(180);
const coordinatesSchema = z.object({ latitude, longitude });

/** A complaint as it is logged. The place is the resident's (exact, private) or, where unknown, a station nearby. */
export const newComplaintSchema = z
  .object({
    from: instant,
    to: instant,
    kind: z.enum(COMPLAINT_KINDS, { error: 'must be one of the list' }),
    latitude: latitude.nullable().default(null),
    longitude: longitude.nullable().default(null),
    station: z.string().max(32).nullable().default(null),
    area: z
      .string()
      .max(80)
      .nullable()
      .default(null)
      .describe(
        'Of the areas of the residents’ form; its station is the nearest one where no coordinates are given',
      ),
    words: z.string().trim().max(4000, 'must have at most 4000 characters').default(''),
    contact: contactSchema.prefault({}),
  })
  .superRefine((complaint, context) => {
    const issue = (path: string, message: string) =>
      context.addIssue({ code: 'custom', path: [path], message });
    if (complaint.to <= complaint.from) issue('to', 'must be after the beginning');
    if (complaint.to - complaint.from > MOST_WINDOW_DAYS * 86_400) {
      issue(
        'to',
        `must be at most ${MOST_WINDOW_DAYS} days after the beginning; log the noise of each week apart`,
      );
    }
    if ((complaint.latitude === null) !== (complaint.longitude === null)) {
      issue(
        complaint.latitude === null ? 'latitude' : 'longitude',
        'must be given together with the other one',
      );
    }
    const hasPlace = complaint.latitude !== null || complaint.longitude !== null;
    if (!hasPlace && complaint.station === null && complaint.area === null) {
      issue('station', 'must be chosen where neither coordinates nor an area are given');
    }
  });
export type NewComplaint = z.output<typeof newComplaintSchema>;

/** What everybody with a role in the network may read of a complaint. */
const complaintSchema = z.object({
  reference: z.string(),
  from: z.string(),
  to: z.string(),
  kind: z.enum(COMPLAINT_KINDS),
  status: z.enum(COMPLAINT_STATUSES),
  source: z.enum(COMPLAINT_SOURCES),
  dueOn: localDate,
  isOverdue: z.boolean(),
  coarsePlace: coordinatesSchema
    .nullable()
    .describe('Rounded to the step of the desk’s settings; null where only a station or an area was named'),
  nearestStation: z.string().nullable(),
  area: z.string().nullable().describe('Of the areas of the residents’ form, where one was chosen'),
  assignedTo: z.string().nullable().describe('Name of the person who answers it'),
  mergedInto: z.string().nullable().describe('Reference of the complaint that this one repeats'),
  createdAt: z.string(),
  answeredAt: z.string().nullable(),
  closedAt: z.string().nullable(),
  closingReason: z.enum(CLOSING_REASONS).nullable(),
});
export type Complaint = z.output<typeof complaintSchema>;

/** Personal data of a complaint: liaison and administrator only, every look is audited. */
export const personalDataSchema = z.object({
  contact: z.object({
    name: z.string().nullable(),
    email: z.string().nullable(),
    phone: z.string().nullable(),
    address: z.string().nullable(),
  }),
  words: z.string(),
  place: coordinatesSchema.nullable(),
  effects: z.array(z.enum(COMPLAINT_EFFECTS)).optional(),
});
export type PersonalData = z.output<typeof personalDataSchema>;

/** How a reply leaves: by the outbox (the first three), or on paper where there is no address. */
const REPLY_STATES = ['waiting', 'sent', 'dead', 'letter', 'posted'] as const;

const replySchema = z.object({
  id: z.number().int(),
  sentAt: z.string(),
  sentBy: z.string(),
  approvedBy: z.string().nullable().describe('The second person, where one approved it'),
  delivery: z
    .enum(REPLY_STATES)
    .describe(
      '"waiting": queued; "sent": handed to the mail server; "dead": given up; "letter": to be printed and posted; "posted": so it was',
    ),
  deliveredAt: z.string().nullable().describe('When it was handed to the mail server'),
  attempts: z.number().int().nullable(),
  failure: z.string().nullable().describe('Why the last attempt failed, without an address'),
  postedOn: localDate.nullable(),
  items: packItemsSchema
    .nullable()
    .describe('Items of the evidence that went with it; null: sent before there was a choice'),
  hasPdf: z.boolean(),
  text: z.string().nullable().optional().describe('Left out for those who may not read it; null once erased'),
  figures: evidenceSchema,
});
export type Reply = z.output<typeof replySchema>;

const complaintDetailSchema = complaintSchema.extend({
  evidence: evidenceSchema,
  replies: z.array(replySchema),
  private: personalDataSchema
    .nullable()
    .optional()
    .describe('Left out for those who may not read it; null once erased'),
});

export const newReplySchema = z.object({
  text: z
    .string()
    .trim()
    .min(1, 'must not be empty')
    .max(20_000, 'must have at most 20,000 characters')
    .transform((text) => text.replaceAll('\r\n', '\n'))
    .describe(
      'May have fields such as {{laeq}}, which are filled in from the figures; levels are never typed',
    ),
  items: packItemsSchema
    .nullable()
    .default(null)
    .describe('Items of the evidence that go along; null: the usual ones'),
  figuresDigest: z
    .string()
    .nullable()
    .default(null)
    .describe(
      'Digest of the evidence that the text was written from; refused with 409 when the figures changed since',
    ),
  repliesSoFar: z
    .number()
    .int()
    .nullable()
    .default(null)
    .describe('How many replies the writer knew of; refused with 409 when another one went out meanwhile'),
});
export type NewReply = z.output<typeof newReplySchema>;

const listOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), next: z.string().nullable() });

const base = '/api/v1/networks/{network}/complaints';
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
  summary: 'Complaints by due date, never with personal data',
  request: {
    params: z.object({ network }),
    query: z.object({
      from: z.string().optional(),
      to: z.string().optional(),
      status: z.enum(COMPLAINT_STATUSES).optional(),
      limit: z.string().optional(),
      cursor: z.string().optional(),
    }),
  },
  responses: { 200: answer('A page of the list', listOf(complaintSchema)) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Log a complaint (liaison)',
  request: { params: z.object({ network }), body: body(newComplaintSchema) },
  responses: { 201: answer('The complaint as logged', z.object({ complaint: complaintSchema })) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{reference}`,
  summary: 'A complaint with the evidence of its window; personal data for liaison and administrator only',
  request: { params: z.object({ network, reference: z.string() }) },
  responses: { 200: answer('The complaint', complaintDetailSchema) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{reference}/replies`,
  summary: 'Send the reply (liaison): e-mailed, and kept with the figures it carries',
  request: { params: z.object({ network, reference: z.string() }), body: body(newReplySchema) },
  responses: { 201: answer('The reply as kept', z.object({ reply: replySchema })) },
});
const pdf = (description: string) => ({
  description,
  content: { 'application/pdf': { schema: z.string().describe('PDF') } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{reference}/replies/{id}/letter`,
  summary: 'A reply as it was sent, with its evidence (liaison); every look is audited',
  request: { params: z.object({ network, reference: z.string(), id: z.string() }) },
  responses: { 200: pdf('The letter') },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{reference}/answer`,
  summary:
    'The answer that is being written, exactly as it would be sent now (liaison); every look is audited',
  request: { params: z.object({ network, reference: z.string() }) },
  responses: { 200: pdf('The letter') },
});
