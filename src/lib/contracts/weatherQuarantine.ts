import { z } from 'zod';
import { reasonText } from './common';
import { quarantinedSchema } from './quarantine';
import { registerRoute } from './registry';

/** Most records that one act settles; what is left can be asked for again. */
export const MOST_WEATHER_SETTLED = 5000;

const refusedWeatherSchema = quarantinedSchema
  .omit({ station: true, importId: true })
  .extend({ record: z.unknown().describe('As received') });
export type RefusedWeatherRecord = z.output<typeof refusedWeatherSchema>;

const WEATHER_ACTS = ['release', 'replace', 'dismiss', 'reopen'] as const;

export const weatherSettlementSchema = z
  .object({
    act: z
      .enum(WEATHER_ACTS, 'is not something that can be done')
      .describe(
        'release: take them as a post would now; replace: one, in place of the stored record of its start; reopen: undo dismissals',
      ),
    ids: z
      .array(z.number().int().min(1))
      .min(1, 'must name a record')
      .max(MOST_WEATHER_SETTLED)
      .optional()
      .describe('Left out: all of the mast that it may be done to'),
    reason: reasonText.nullish().describe('Needed to dismiss and to replace'),
  })
  .refine(({ act, reason }) => (act !== 'dismiss' && act !== 'replace') || Boolean(reason), {
    path: ['reason'],
    message: 'say why',
  })
  .refine(({ act, ids }) => act !== 'replace' || ids?.length === 1, {
    path: ['ids'],
    message: 'replacing is for one record at a time',
  });
export type WeatherSettling = z.output<typeof weatherSettlementSchema>;

const weatherSettledSchema = z.object({
  settled: z.number().int(),
  passedOver: z.number().int().describe('Still refused, not there, or not in a state for it'),
  detail: z.string().nullable().describe('Why the first of those that are still refused is'),
});
export type WeatherSettled = z.output<typeof weatherSettledSchema>;

const path = '/api/v1/networks/{network}/masts/{code}/refused';
const params = z.object({ network: z.string(), code: z.string() });

registerRoute({
  access: 'person',
  method: 'get',
  path,
  summary: 'Refused records of a weather mast that are kept, latest first, at most 1,000',
  request: {
    params,
    query: z.object({ state: z.enum(['open', 'released', 'dismissed', 'superseded', 'all']).optional() }),
  },
  responses: {
    200: {
      description: 'The records',
      content: { 'application/json': { schema: z.object({ items: z.array(refusedWeatherSchema) }) } },
    },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${path}/settlements`,
  summary: 'Release, dismiss or reopen refused records of a weather mast (operator)',
  request: { params, body: { content: { 'application/json': { schema: weatherSettlementSchema } } } },
  responses: {
    200: {
      description: 'What came of it',
      content: { 'application/json': { schema: z.object({ outcome: weatherSettledSchema }) } },
    },
  },
});
