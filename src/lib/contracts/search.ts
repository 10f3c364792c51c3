import { z } from 'zod';
import { registerRoute } from './registry';

const HIT_KINDS = ['page', 'station', 'limit', 'complaint', 'month'] as const;
export type HitKind = (typeof HIT_KINDS)[number];

export const searchQuerySchema = z.object({
  q: z
    .string()
    .max(100, 'must have at most 100 characters')
    .default('')
    .describe('Words that all occur in what is looked for; empty: pages and stations'),
});

const hitSchema = z.object({
  kind: z.enum(HIT_KINDS),
  label: z.string(),
  detail: z.string().describe('What tells it from others of the same label, or empty'),
  href: z.string().describe('Path of its page'),
});
export type Hit = z.output<typeof hitSchema>;

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/search',
  summary: 'Find pages, stations, limits, complaints by their reference, and months of a network',
  description: 'Of what the caller’s roles open, best first. Complaints are found by reference only.',
  request: { params: z.object({ network: z.string() }), query: searchQuerySchema },
  responses: {
    200: {
      description: 'At most 60 hits',
      content: { 'application/json': { schema: z.object({ items: z.array(hitSchema), next: z.null() }) } },
    },
  },
});
