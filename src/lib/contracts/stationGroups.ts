import { z } from 'zod';
import { shortText } from './common';
import { registerRoute } from './registry';

export const newStationGroupSchema = z.object({
  name: shortText,
  stations: z
    .array(z.string().max(32))
    .min(1, 'must name at least one station')
    .max(500, 'must name at most 500 stations')
    .describe('Codes'),
});
export type NewStationGroup = z.output<typeof newStationGroupSchema>;

const stationGroupSchema = z.object({
  id: z.number().int(),
  name: z.string(),
  stations: z.array(z.string()).describe('Codes of its stations as they are now'),
  changedAt: z.string(),
  changedBy: z.string().nullable(),
  limits: z
    .array(z.object({ id: z.number().int(), name: z.string() }))
    .describe('Limits that stand and apply to it, now or by a version to come'),
});
export type StationGroupView = z.output<typeof stationGroupSchema>;

const base = '/api/v1/networks/{network}/station-groups';
const network = z.string();
const params = z.object({ network, id: z.string() });
const body = { content: { 'application/json': { schema: newStationGroupSchema } } };
const one = { 'application/json': { schema: z.object({ group: stationGroupSchema }) } };
const all = {
  'application/json': { schema: z.object({ items: z.array(stationGroupSchema), next: z.null() }) },
};

registerRoute({
  access: 'person',
  method: 'get',
  path: base,
  summary: 'Groups of stations, which limits may apply to',
  request: { params: z.object({ network }) },
  responses: { 200: { description: 'By name', content: all } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: base,
  summary: 'Make a group of stations (operator)',
  request: { params: z.object({ network }), body },
  responses: { 201: { description: 'The group', content: one } },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: `${base}/{id}`,
  summary:
    'Change a group (operator): each limit on it gets a version with the stations of now, for windows that begin from now on',
  request: { params, body },
  responses: { 200: { description: 'The group as changed', content: one } },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: `${base}/{id}`,
  summary: 'Delete a group (operator) that no limit ever applied to',
  request: { params },
  responses: { 204: { description: 'Deleted' } },
});
