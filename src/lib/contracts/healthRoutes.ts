import { z } from 'zod';
import {
  coverageDaySchema,
  healthSettingsSchema,
  stationHealthSchema,
  thresholdsSchema,
  troubleSchema,
} from './health';
import { registerRoute } from './registry';

const base = '/api/v1/networks/{network}/health';
const params = z.object({ network: z.string() });
const json = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const answer = (description: string, schema: z.ZodType) => ({ description, ...json(schema) });
const settings = z.object({
  defaults: thresholdsSchema,
  network: thresholdsSchema,
  recipients: z.array(z.string()),
  stations: z.array(z.object({ station: z.string(), thresholds: thresholdsSchema })),
});

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'How the stations are, and what is wrong with them, worst first; `…/health.csv` as a file',
  request: { params },
  responses: {
    200: answer(
      'Now',
      z.object({ stations: z.array(stationHealthSchema), troubles: z.array(troubleSchema) }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/troubles`,
  summary: 'Troubles that overlap a period, latest first',
  request: {
    params,
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
      z.object({ items: z.array(troubleSchema), next: z.string().nullable() }),
    ),
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/settings`,
  summary: 'Bounds beyond which something is a trouble',
  request: { params },
  responses: { 200: answer('Of the network and of its stations', settings) },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/settings`,
  summary: 'Set the bounds of the network or of one station, in the place of those set before (operator)',
  request: { params, body: json(healthSettingsSchema) },
  responses: { 200: answer('Of the network and of its stations', settings) },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: `${base}/coverage`,
  summary: 'Coverage of each local day of a station; `…/health/coverage.csv` as a file',
  request: { params, query: z.object({ station: z.string(), from: z.string(), to: z.string() }) },
  responses: { 200: answer('Day by day', z.object({ days: z.array(coverageDaySchema) })) },
});
