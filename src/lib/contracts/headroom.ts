import { z } from 'zod';
import { LIMIT_METRICS } from '#lib/acoustics/limitQuantities';
import { registerRoute } from './registry';

const HEADROOM_STATES = [
  'open',
  'no-data',
  'certain',
  'passed',
  'not-compared',
  'dismissed',
  'not-foretold',
] as const;
const HEADING_SOURCES = ['last-15-min', 'so-far'] as const;

const level = (description: string) => z.number().nullable().describe(`${description}, dB`);
const seconds = (description: string) => z.number().int().describe(description);

const limitHeadroomSchema = z.object({
  limit: z.object({
    id: z.number().int(),
    version: z.number().int(),
    name: z.string(),
    metric: z.enum(LIMIT_METRICS),
    descriptor: z.string().describe('What is compared, in words: "LAeq,15 min"'),
    threshold: z.number().describe('dB; of limits on a share of time per cent, on events their number'),
  }),
  from: z.string(),
  to: z.string(),
  state: z
    .enum(HEADROOM_STATES)
    .describe(
      'certain: above the limit even if the rest is silent, once coverage suffices; passed: a maximum was above; ' +
        'not-compared: the coverage that it takes cannot be reached any more; dismissed: not compared for its wind, even if the ' +
        'rest is as calm as the limit lets count; not-foretold: rolling windows, of which many are open at once, and quantities other than LAeq, LAFmax and the level of bands',
    ),
  level: level('Mean, or maximum, of the valid data so far'),
  windWords: z
    .string()
    .nullable()
    .describe(
      'The wind that the limit goes by, in words: what was measured in it counts, and all of the rest is taken to have it; null: any',
    ),
  seconds: z.object({
    valid: seconds('Seconds that the level stands on'),
    missing: seconds('Before the newest data: not measured, or left out'),
    awaited: seconds('Since the newest data: may still arrive'),
    left: seconds('From now to the end of the window'),
    needed: seconds('Valid seconds that it still takes to be compared; 0: enough'),
  }),
  headroom: level(
    'What the rest (awaited and left, all of it measured) may be on average for the window to end at the limit; for a maximum ' +
      'the limit. Null when nothing may be added, or nothing is compared',
  ),
  heading: z
    .object({ level: z.number(), from: z.enum(HEADING_SOURCES) })
    .nullable()
    .describe('Where the mean ends if the rest is like the last 15 minutes or, without these, like so far'),
  usualHigh: level(
    '90 % point of LAeq over the rest by the clock in the eight weeks before; null of limits that go by the wind',
  ),
  earliestPassing: z
    .string()
    .nullable()
    .describe('When, at that loud but usual level, it would be certain to pass; null: not within the window'),
});
export type LimitHeadroom = z.output<typeof limitHeadroomSchema>;

const headroomSchema = z.object({
  at: z.string().describe('The instant that it is told of'),
  items: z.array(limitHeadroomSchema).describe('Limits whose window is open, the one that ends first first'),
});
export type Headroom = z.output<typeof headroomSchema>;

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/stations/{code}/headroom',
  summary: 'How loud the rest of each window may be that a limit is measuring now',
  request: { params: z.object({ network: z.string(), code: z.string() }) },
  responses: {
    200: { description: 'The headroom', content: { 'application/json': { schema: headroomSchema } } },
  },
});
