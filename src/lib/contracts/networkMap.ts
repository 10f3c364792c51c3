import { z } from 'zod';
import { registerRoute } from './registry';

const base = '/api/v1/networks/{network}';
const params = z.object({ network: z.string() });
const degrees = z.number();
const json = (description: string, schema: z.ZodType) => ({
  200: { description, content: { 'application/json': { schema } } },
});

const networkLevelsSchema = z.object({
  from: z.string(),
  to: z.string(),
  stepSeconds: z.number().int(),
  minimumCoverage: z
    .number()
    .describe('Share of a quarter-hour that must be valid for its level to be compared'),
  stations: z.array(
    z.object({
      station: z.string(),
      LAeq: z
        .array(z.number().nullable())
        .describe('Of each quarter-hour, dB; null where nothing contributes'),
      validSeconds: z.array(z.number().int()).describe('Of each quarter-hour'),
      exceeded: z
        .array(z.object({ from: z.string(), to: z.string() }))
        .describe('Windows of standing exceedances that overlap the period'),
    }),
  ),
});
export type NetworkLevels = z.output<typeof networkLevelsSchema>;

const mapLayersSchema = z.object({
  from: z.string(),
  to: z.string(),
  exceedances: z
    .array(z.object({ station: z.string(), count: z.number().int() }))
    .describe('Standing ones whose window overlaps the period; stations without any are left out'),
  complaints: z.object({
    places: z
      .array(z.object({ latitude: degrees, longitude: degrees, references: z.array(z.string()) }))
      .describe('Rounded to 0.01 degree, for every reader: it names no house'),
    withoutPlace: z.array(z.string()).describe('References of those that tell no place'),
    isComplete: z.boolean().describe('False where the period has more than are given here'),
  }),
});
export type MapLayers = z.output<typeof mapLayersSchema>;

const networkWindSchema = z.object({
  at: z.string(),
  items: z.array(
    z.object({
      source: z.enum(['mast', 'station']),
      code: z.string(),
      name: z.string(),
      latitude: degrees,
      longitude: degrees,
      speed: z.number().describe('m/s'),
      direction: z.number().nullable().describe('Degrees clockwise of north that it comes from'),
      ageSeconds: z.number().int().describe('From the end of the record to the instant asked for'),
    }),
  ),
});
export type NetworkWind = z.output<typeof networkWindSchema>;

const period = z.object({ from: z.string(), to: z.string() });

registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/levels`,
  summary: 'LAeq of every quarter-hour of at most 26 hours, of every station',
  request: { params, query: period },
  responses: json('By station; the period widened to whole quarter-hours', networkLevelsSchema),
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/map-layers`,
  summary: 'Exceedances and complaints of a period, as a map shows them',
  request: { params, query: period },
  responses: json('Without anything personal', mapLayersSchema),
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/wind`,
  summary: 'Wind of each mast and of each station with a sensor, as of an instant',
  request: { params, query: z.object({ at: z.string().optional().describe('Now by default') }) },
  responses: json('Only records not older than an hour', networkWindSchema),
});
