import { z } from 'zod';
import { registerRoute } from './registry';
import { summaryTemplateSchema } from './summaryTemplate';

export const DEFAULT_GRACE_DAYS = 5;
export const MOST_GRACE_DAYS = 28;
export const MOST_MARK_BYTES = 512 * 1024;

/** How a network’s months are drafted and printed. */
export const summarySettingsSchema = z.object({
  graceDays: z
    .number('must be a whole number of days')
    .int('must be a whole number of days')
    .min(0, 'must be at least 0')
    .max(MOST_GRACE_DAYS, `must be at most ${MOST_GRACE_DAYS}`)
    .describe('Days after a month’s last night before it is drafted, for data that come late'),
  template: summaryTemplateSchema,
});
export type SummarySettings = z.output<typeof summarySettingsSchema>;

const answer = summarySettingsSchema.extend({
  version: z.number().int().describe('0: nobody has set anything'),
  hasMark: z.boolean(),
});
export type SummarySettingsAnswer = z.output<typeof answer>;

const path = '/api/v1/networks/{network}/summary-settings';
const params = z.object({ network: z.string() });
const responses = {
  200: { description: 'What holds now', content: { 'application/json': { schema: answer } } },
};

registerRoute({
  access: 'person',
  method: 'get',
  path,
  summary: 'How months are drafted and printed',
  request: { params },
  responses,
});
registerRoute({
  access: 'person',
  method: 'put',
  path,
  summary: 'Set how months are drafted and printed; a new version',
  request: { params, body: { content: { 'application/json': { schema: summarySettingsSchema } } } },
  responses,
});
