import { z } from 'zod';
import { dataAsOfSchema, localDate } from './common';
import { LIMIT_UNITS } from './limitMetrics';
import { newLimitSchema } from './limits';
import { registerRoute } from './registry';

/** The longest stretch that a limit is tried on, in days. */
export const MOST_TRIAL_DAYS = 366;
/** Windows that an answer lists; all of them are counted. */
export const MOST_TRIAL_WINDOWS = 1000;

const DAY_MS = 86_400_000;

export const limitTrialSchema = z
  .object({
    limit: newLimitSchema.describe('As it would be set; when it begins does not matter here'),
    from: localDate.describe('First date, by the clock of the network'),
    to: localDate.describe('The date after the last one'),
    basedOn: z
      .number()
      .int()
      .positive()
      .nullable()
      .default(null)
      .describe('A limit whose version of today is tried on the same dates, for comparison'),
  })
  .superRefine(({ from, to }, context) => {
    const days = (Date.parse(to) - Date.parse(from)) / DAY_MS;
    if (days > 0 && days <= MOST_TRIAL_DAYS) return;
    const message = days > 0 ? `must be at most ${MOST_TRIAL_DAYS} days after the first` : 'must be later';
    context.addIssue({ code: 'custom', path: ['to'], message });
  });
export type LimitTrialQuery = z.output<typeof limitTrialSchema>;

const countsSchema = z.object({
  windows: z.number().int().describe('Windows that begin within the dates and have ended'),
  compared: z.number().int().describe('Of these, with the coverage that it takes'),
  uncovered: z.number().int().describe('With data, but too few'),
  empty: z.number().int().describe('Without any valid data of the quantity'),
  dismissed: z
    .number()
    .int()
    .describe('Not compared by the limit’s wind: too much of it, or too little known'),
  caught: z.number().int().describe('Above the limit'),
});
export type TrialCounts = z.output<typeof countsSchema>;

const trialSchema = z.object({
  descriptor: z.string(),
  windWords: z
    .string()
    .nullable()
    .describe('The wind that it goes by, in words; null: any that counts in the network'),
  threshold: z.number(),
  unit: z.enum(LIMIT_UNITS).describe('Of the threshold and of levels'),
  counts: countsSchema,
  stations: z.array(countsSchema.extend({ code: z.string(), name: z.string() })),
  weeks: z
    .array(z.object({ from: z.string().describe('Its Monday'), caught: z.number().int() }))
    .describe('Every week that the dates touch'),
  mails: z
    .number()
    .int()
    .describe('E-mails to each recipient, had it been in force: windows that end together are told in one'),
});
export type TrialSummary = z.output<typeof trialSchema>;

const windowSchema = z.object({
  station: z.string(),
  from: z.string(),
  to: z.string(),
  level: z.number().describe('dB'),
  above: z.number().describe('By how much, of the level rounded half up to tenths, dB'),
  coverage: z.number(),
});

const limitTrialAnswerSchema = z.object({
  from: z.string(),
  to: z.string(),
  dataAsOf: dataAsOfSchema,
  trial: trialSchema,
  windows: z
    .array(windowSchema.extend({ isCaughtToday: z.boolean().nullable() }))
    .describe(`What it would have caught, in order of time, at most ${MOST_TRIAL_WINDOWS}`),
  today: trialSchema
    .extend({
      limitId: z.number().int(),
      version: z.number().int(),
      caughtAlone: z.number().int().describe('How many windows it alone catches'),
    })
    .nullable(),
  onlyToday: z
    .array(windowSchema)
    .describe(`What only the version of today catches, at most ${MOST_TRIAL_WINDOWS}`),
});
export type LimitTrialAnswer = z.output<typeof limitTrialAnswerSchema>;
export type TrialWindow = z.output<typeof windowSchema>;

registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/networks/{network}/limits/trial',
  summary: 'Try a limit on past data (operator): nothing is set, stored or told',
  description:
    'With `Accept: text/event-stream` events `progress` (`{"done","all"}` in days of stations) come before `result`; closing the ' +
    'connection cancels the trial. Trials of more than a month that read every interval follow each other; 503 when too many wait.',
  request: {
    params: z.object({ network: z.string() }),
    body: { content: { 'application/json': { schema: limitTrialSchema } } },
  },
  responses: {
    200: {
      description: 'What it would have caught',
      content: { 'application/json': { schema: limitTrialAnswerSchema } },
    },
  },
});
