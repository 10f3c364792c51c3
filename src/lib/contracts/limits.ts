import { z } from 'zod';
import { clockTime, instant, reasonText, shortText } from './common';
import { limitBandFraction, LIMIT_UNITS, limitMetric, metricFields, metricIssues } from './limitMetrics';
import { windFields, windIssues } from './limitWind';
import { holidayRule, windowFields, windowIssues } from './limitWindows';
import { registerRoute } from './registry';

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
  ...metricFields,
  ...windowFields,
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
  ...windFields,
  stations: z
    .array(z.string().max(32))
    .min(1, 'must name at least one station')
    .max(500, 'must name at most 500 stations')
    .nullable()
    .default(null)
    .describe('Codes; null: every station of the network, later ones too'),
  group: z
    .number('must be chosen')
    .int('must be chosen')
    .positive('must be chosen')
    .nullable()
    .default(null)
    .describe('Number of a group of stations, instead of `stations`: those that it has at the time'),
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
  if (limit.group !== null && limit.stations !== null)
    issue('stations', 'must be left out where a group is named');
  for (const [field, message] of [...metricIssues(limit), ...windowIssues(limit), ...windIssues(limit)])
    issue(field, message);
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
  metric: limitMetric,
  window: windowFields.window,
  windowMinutes: z.number().int().nullable(),
  stepMinutes: z.number().int().nullable(),
  bandHz: z.number().nullable(),
  bandFraction: limitBandFraction.nullable(),
  bandToHz: z.number().nullable(),
  percent: z.number().int().nullable(),
  eventThreshold: z.number().nullable(),
  eventSeconds: z.number().int().nullable(),
  eventGap: z.number().int().nullable(),
  backgroundFrom: z.string().nullable(),
  backgroundTo: z.string().nullable(),
  descriptor: z.string().describe('What is compared, in words: "LAeq,15 min"'),
  threshold: z.number(),
  unit: z.enum(LIMIT_UNITS).describe('Of the threshold, and of what is measured against it'),
  weekdays: z.array(z.enum(WEEKDAYS)),
  holidays: holidayRule,
  from: z.string().nullable(),
  to: z.string().nullable(),
  minimumCoverage: minimumCoverage.nullable(),
  windMinimum: z.number().nullable(),
  windMaximum: z.number().nullable(),
  windFrom: z.number().int().nullable(),
  windTo: z.number().int().nullable(),
  windDismissAbove: z.number().nullable(),
  windUnknown: windFields.windUnknown,
  windWords: z
    .string()
    .nullable()
    .describe('The wind that it goes by, in words; null: any that counts in the network'),
  stations: z.array(z.string()).nullable().describe('Of a group those that this version holds for'),
  group: z.number().int().nullable(),
  groupName: z.string().nullable(),
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

const limitSchema = limitVersionSchema.extend({
  id: z.number().int(),
  state: z.enum(['in-force', 'upcoming', 'withdrawn']),
  nextVersionFrom: z.string().nullable().describe('When a version that is decided already takes over'),
  withdrawal: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string() })
    .nullable()
    .describe('Null while the limit stands'),
});
export type Limit = z.output<typeof limitSchema>;

const limitDetailSchema = z.object({
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
