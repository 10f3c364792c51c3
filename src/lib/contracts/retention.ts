import { z } from 'zod';
import { registerRoute } from './registry';

/** Fewer would take away what usual levels, drift and limits look back at. */
export const LEAST_KEEP_MONTHS = 13;
export const MOST_KEEP_MONTHS = 600;

const wrong = `must be a whole number of months from ${LEAST_KEEP_MONTHS} to ${MOST_KEEP_MONTHS}, or null`;
const keepMonthsSchema = z
  .number(wrong)
  .int(wrong)
  .min(LEAST_KEEP_MONTHS, wrong)
  .max(MOST_KEEP_MONTHS, wrong)
  .nullable();

/** For how long single intervals are kept; deleting has to be said. */
export const retentionChangeSchema = z
  .object({
    keepMonths: keepMonthsSchema.describe('Whole months; null: single intervals are kept for good'),
    deletes: z
      .literal(true, 'must be true, as what is deleted does not come back')
      .optional()
      .describe('Asked for with a number of months: single intervals that are older are deleted for good'),
  })
  .refine(({ keepMonths, deletes }) => keepMonths === null || deletes === true, {
    path: ['deletes'],
    message: 'must be true, as what is deleted does not come back',
  });

const retentionSchema = z.object({
  keepMonths: z.number().int().nullable().describe('Null: single intervals are kept for good'),
  sealedBefore: z
    .string()
    .nullable()
    .describe('What is computed of earlier time stays as it is; null: nothing was sealed yet'),
  keptFrom: z.string().nullable().describe('Single intervals that begin before may be gone'),
});
export type RetentionAnswer = z.output<typeof retentionSchema>;

const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const params = z.object({ network: z.string() });

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/retention',
  summary: 'For how long a network keeps single intervals, and what is gone',
  request: { params },
  responses: { 200: { description: 'The retention', ...jsonOf(retentionSchema) } },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: '/api/v1/networks/{network}/retention',
  summary: 'Say for how long a network keeps single intervals (administrator, not with an access token)',
  request: { params, body: jsonOf(retentionChangeSchema) },
  responses: { 200: { description: 'The retention', ...jsonOf(retentionSchema) } },
});
