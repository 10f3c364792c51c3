import { z } from 'zod';
import { schemeProblem } from '#lib/acoustics/dayEveningNight';
import { clockTime, instant, shortText } from './common';
import { registerRoute } from './registry';

const timeZone = z
  .string()
  .refine(isTimeZone, 'must be a zone of the IANA time-zone database, such as Europe/London');

function isTimeZone(zone: string): boolean {
  try {
    return new Intl.DateTimeFormat('en', { timeZone: zone }).resolvedOptions().timeZone !== '';
  } catch {
    return false;
  }
}

const periods = z
  .object({
    day: clockTime,
    evening: clockTime.nullable().default(null).describe('Null: no evening'),
    night: clockTime,
  })
  .superRefine(({ day, evening, night }, context) => {
    const problem = schemeProblem({ dayStartMin: day, eveningStartMin: evening, nightStartMin: night });
    if (problem) context.addIssue({ code: 'custom', message: problem });
  })
  .describe('When each period of the day begins, local time');

const minimumCoverage = z
  .number('must be a number')
  .min(0, 'must be 0 to 1, that is 0 to 100 %')
  .max(1, 'must be 0 to 1, that is 0 to 100 %')
  .describe('Share of a period that must be valid for its level to count');
const maximumWindSpeed = z
  .number('must be a number of m/s')
  .min(0, 'must be 0 to 100 m/s')
  .max(100, 'must be 0 to 100 m/s')
  .describe('Intervals with more wind are left out, m/s');
const excludeRain = z.boolean().describe('Whether intervals flagged rain are left out');

export const newNetworkSchema = z.object({
  slug: z
    .string()
    .trim()
    .regex(/^[a-z0-9](?:[a-z0-9-]{0,62}[a-z0-9])?$/, 'must be lower-case letters, digits and hyphens'),
  name: shortText,
  timeZone,
  periods: periods.default({ day: 420, evening: 1140, night: 1380 }),
  minimumCoverage: minimumCoverage.default(0.75),
  maximumWindSpeed: maximumWindSpeed.default(5),
  excludeRain: excludeRain.default(false),
});
export type NewNetwork = z.output<typeof newNetworkSchema>;

export const networkChangesSchema = z
  .object({
    name: shortText,
    timeZone,
    periods,
    minimumCoverage,
    maximumWindSpeed,
    excludeRain,
    effectiveFrom: instant.describe('From when new settings hold; now, if left out'),
  })
  .partial()
  .strict();
export type NetworkChanges = z.output<typeof networkChangesSchema>;

const networkSchema = z.object({
  slug: z.string(),
  name: z.string(),
  timeZone: z.string(),
  periods: z.object({ day: z.string(), evening: z.string().nullable(), night: z.string() }),
  minimumCoverage: z.number(),
  maximumWindSpeed: z.number(),
  excludeRain: z.boolean(),
  settingsSince: z.string().nullable().describe('From when these settings hold; null: from the beginning'),
});
export type Network = z.output<typeof networkSchema>;

const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const params = z.object({ network: z.string() });
const one = z.object({ network: networkSchema });

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks',
  summary: 'Networks that the caller may see, by name',
  responses: {
    200: {
      description: 'All of them',
      ...jsonOf(z.object({ items: z.array(networkSchema), next: z.null() })),
    },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/networks',
  summary: 'Make a network (administrator)',
  request: { body: jsonOf(newNetworkSchema) },
  responses: { 201: { description: 'The network', ...jsonOf(one) } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}',
  summary: 'A network with the settings in force now',
  request: { params },
  responses: { 200: { description: 'The network', ...jsonOf(one) } },
});
registerRoute({
  access: 'person',
  method: 'patch',
  path: '/api/v1/networks/{network}',
  summary: 'Rename a network or give it new settings from an instant on (operator)',
  request: { params, body: jsonOf(networkChangesSchema) },
  responses: { 200: { description: 'The network as it is now', ...jsonOf(one) } },
});
