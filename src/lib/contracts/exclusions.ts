import { z } from 'zod';
import { instant, reasonText } from './common';
import { registerRoute } from './registry';

/** Longest exclusion, in days: a longer one is more likely a slip than a fault. */
export const MOST_EXCLUSION_DAYS = 366;

export const newExclusionSchema = z
  .object({ station: z.string().max(32), from: instant, to: instant, reason: reasonText })
  .superRefine((exclusion, context) => {
    if (exclusion.to <= exclusion.from) {
      context.addIssue({ code: 'custom', path: ['to'], message: 'must be after the beginning' });
    }
    if (exclusion.to - exclusion.from > MOST_EXCLUSION_DAYS * 86_400) {
      const message = `must be at most ${MOST_EXCLUSION_DAYS} days after the beginning`;
      context.addIssue({ code: 'custom', path: ['to'], message });
    }
  });
export type NewExclusion = z.output<typeof newExclusionSchema>;

export const withdrawalSchema = z.object({ reason: reasonText });

export const exclusionSchema = z.object({
  id: z.number().int(),
  station: z.string(),
  from: z.string(),
  to: z.string(),
  reason: z.string(),
  createdAt: z.string(),
  createdBy: z.string().nullable().describe('Name of the person'),
  withdrawal: z
    .object({ at: z.string(), by: z.string().nullable(), reason: z.string() })
    .nullable()
    .describe('Null while the exclusion stands'),
});
export type Exclusion = z.output<typeof exclusionSchema>;

const base = '/api/v1/networks/{network}/exclusions';
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
  summary: 'Exclusions that overlap a period, withdrawn ones too, latest first',
  request: {
    params: z.object({ network }),
    query: z.object({
      from: z.string().optional(),
      to: z.string().optional(),
      station: z.string().optional(),
      limit: z.string().optional(),
      cursor: z.string().optional(),
    }),
  },
  responses: {
    200: answer(
      'A page of the list',
      z.object({ items: z.array(exclusionSchema), next: z.string().nullable() }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Leave a period of a station out of statistics (operator); the data stay',
  request: { params: z.object({ network }), body: body(newExclusionSchema) },
  responses: { 201: answer('The exclusion', z.object({ exclusion: exclusionSchema })) },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: `${base}/{id}/withdrawal`,
  summary:
    'Withdraw an exclusion (operator); its period counts again, and the exclusion is kept as withdrawn',
  request: { params: z.object({ network, id: z.string() }), body: body(withdrawalSchema) },
  responses: { 200: answer('The exclusion as withdrawn', z.object({ exclusion: exclusionSchema })) },
});
