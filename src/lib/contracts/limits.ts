import { z } from 'zod';
import { bandByNominalHz } from '#lib/acoustics/bands';
import { clockTime, instant, reasonText, shortText } from './common';
import { holidayRule, windowFields, windowIssues } from './limitWindows';
import { registerRoute } from './registry';

export const LIMIT_METRICS = ['LAeq', 'LAFmax', 'bandLeq'] as const;
/** In the order of the bits that store them. */
export const WEEKDAYS = ['mon', 'tue', 'wed', 'thu', 'fri', 'sat', 'sun'] as const;
export type Weekday = (typeof WEEKDAYS)[number];

export const MOST_RECIPIENTS = 20;
/** How far back a limit may begin, in days: windows since then are judged anew. */
export const MOST_DAYS_BACK = 366;
/**
 * Windows that ended longer ago make exceedances but no e-mail: a backfill or a limit tried on last year must not send hundreds.
 */
export const TELL_WITHIN_HOURS = 48;

const metric = z
  .enum(LIMIT_METRICS, 'must be one of the list')
  .describe('bandLeq: the unweighted level of one band');
const bandFraction = z.union([z.literal(1), z.literal(3)], 'must be 1 (octaves) or 3 (thirds)');
const threshold = z
  .number('must be a level in dB')
  .min(-20, 'must be −20 to 200 dB')
  .max(200, 'must be −20 to 200 dB')
  .refine((dB) => Math.abs(dB * 10 - Math.round(dB * 10)) < 1e-6, 'must have at most one decimal')
  .describe('dB; exceeded when the level, rounded half up to tenths, is greater');
const minimumCoverage = z
  .number('must be a number')
  .min(0, 'must be 0 to 1, that is 0 to 100 %')
  .max(1, 'must be 0 to 1, that is 0 to 100 %')
  .describe(
    'Coverage that a window needs to be compared; null: the minimum of the network. A maximum needs none',
  );

/** Says which of several addresses it is about. */
const recipient = z
  .email({ error: ({ input }) => `${String(input).slice(0, 60)}: must be an e-mail address` })
  .max(254, 'must have at most 254 characters each');

const fields = {
  name: shortText,
  metric,
  ...windowFields,
  bandHz: z.number('must be a nominal frequency in Hz').nullable().default(null),
  bandFraction: bandFraction.nullable().default(null),
  threshold,
  weekdays: z
    .array(z.enum(WEEKDAYS, `must be from ${WEEKDAYS.join(', ')}`))
    .min(1, 'must name at least one day')
    .default([...WEEKDAYS])
    .describe('Of the local date on which the window begins'),
  holidays: holidayRule.default('as-weekday'),
  from: clockTime
    .nullable()
    .default(null)
    .describe('Local time from which on windows begin, of own hours the beginning; null: all day'),
  to: clockTime.nullable().default(null).describe('Before `from`: across midnight'),
  minimumCoverage: minimumCoverage.nullable().default(null),
  stations: z
    .array(z.string().max(32))
    .min(1, 'must name at least one station')
    .max(500, 'must name at most 500 stations')
    .nullable()
    .default(null)
    .describe('Codes; null: every station of the network, later ones too'),
  recipients: z
    .array(recipient)
    .max(MOST_RECIPIENTS, `must be at most ${MOST_RECIPIENTS} addresses`)
    .default([])
    .describe('Who gets e-mail'),
  effectiveFrom: instant
    .optional()
    .describe(
      `Windows that begin from here on are judged by it; now, if left out. At most ${MOST_DAYS_BACK} days ago; ` +
        `no e-mail tells of new exceedances in windows that ended more than ${TELL_WITHIN_HOURS} h ago`,
    ),
};

type Checked = Omit<z.output<z.ZodObject<typeof fields>>, 'reason'>;

function checkTogether(limit: Checked, context: z.RefinementCtx): void {
  const issue = (path: keyof Checked, message: string) =>
    context.addIssue({ code: 'custom', path: [path], message });
  const { metric: of, bandHz, bandFraction: fraction } = limit;
  if (of === 'bandLeq') {
    if (fraction === null) issue('bandFraction', 'must be given for a band: 1 (octaves) or 3 (thirds)');
    if (bandHz === null) issue('bandHz', 'must be given for a band');
    else if (fraction !== null && !bandByNominalHz(fraction, bandHz))
      issue('bandHz', `must be the nominal frequency of ${fraction === 3 ? 'a third' : 'an octave'}`);
  } else if (bandHz !== null || fraction !== null) {
    issue('bandHz', 'goes with the level of a band only');
  }
  for (const [field, message] of windowIssues(limit)) issue(field, message);
}

export const newLimitSchema = z
  .object({ ...fields, reason: z.string().trim().max(500, 'must have at most 500 characters').default('') })
  .superRefine(checkTogether);
export type NewLimit = z.output<typeof newLimitSchema>;

/** The next version of a limit: all of it, with the reason for the change. */
export const newLimitVersionSchema = z.object({ ...fields, reason: reasonText }).superRefine(checkTogether);

export const limitWithdrawalSchema = z.object({ reason: reasonText });

export const limitVersionSchema = z.object({
  version: z.number().int(),
  name: z.string(),
  metric,
  window: windowFields.window,
  windowMinutes: z.number().int().nullable(),
  stepMinutes: z.number().int().nullable(),
  bandHz: z.number().nullable(),
  bandFraction: bandFraction.nullable(),
  descriptor: z.string().describe('What is compared, in words: "LAeq,15 min"'),
  threshold,
  weekdays: z.array(z.enum(WEEKDAYS)),
  holidays: holidayRule,
  from: z.string().nullable(),
  to: z.string().nullable(),
  minimumCoverage: minimumCoverage.nullable(),
  stations: z.array(z.string()).nullable(),
  recipients: z.array(z.string()).optional().describe('For operators only: addresses are personal data'),
  reason: z.string(),
  effectiveFrom: z.string(),
  effectiveTo: z
    .string()
    .nullable()
    .describe(
      'When another version took over or the limit was withdrawn; not after effectiveFrom: never in force',
    ),
  createdAt: z.string(),
  createdBy: z.string().nullable(),
});
export type LimitVersionView = z.output<typeof limitVersionSchema>;

export const limitSchema = limitVersionSchema.extend({
  id: z.number().int(),
  state: z.enum(['in-force', 'upcoming', 'withdrawn']),
  nextVersionFrom: z.string().nullable().describe('When a version that is decided already takes over'),
  withdrawal: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string() })
    .nullable()
    .describe('Null while the limit stands'),
});
export type Limit = z.output<typeof limitSchema>;

export const limitDetailSchema = z.object({
  limit: limitSchema,
  versions: z.array(limitVersionSchema).describe('Oldest first'),
});
export type LimitDetail = z.output<typeof limitDetailSchema>;

const base = '/api/v1/networks/{network}/limits';
const network = z.string();
const id = z.string();
const answer = (description: string, schema: z.ZodType) => ({
  description,
  content: { 'application/json': { schema } },
});
const body = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const one = z.object({ limit: limitSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Limits of the network as they are now, withdrawn ones too',
  request: { params: z.object({ network }) },
  responses: { 200: answer('All of them', z.object({ items: z.array(limitSchema), next: z.null() })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Set a limit (operator); one that begins in the past has the windows since then judged',
  request: { params: z.object({ network }), body: body(newLimitSchema) },
  responses: { 201: answer('The limit', one) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/{id}`,
  summary: 'A limit with all its versions',
  request: { params: z.object({ network, id }) },
  responses: { 200: answer('The limit', limitDetailSchema) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/versions`,
  summary: 'Change a limit (operator); past exceedances keep the version that they were judged by',
  request: { params: z.object({ network, id }), body: body(newLimitVersionSchema) },
  responses: { 201: answer('The limit', one) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/withdrawal`,
  summary: 'Withdraw a limit (operator): windows that begin from now on are not judged by it',
  request: { params: z.object({ network, id }), body: body(limitWithdrawalSchema) },
  responses: { 200: answer('The limit as withdrawn', one) },
});
