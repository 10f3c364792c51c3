import { z } from 'zod';
import { registerRoute } from './registry';

/** What a new token is to be called, so that people tell it from others. */
export const newStationTokenSchema = z.object({
  label: z
    .string('must be text')
    .trim()
    .max(60, 'must have at most 60 characters')
    .default('')
    .describe('What people tell the token by'),
});

const stationTokenSchema = z.object({
  id: z.number().int(),
  label: z.string(),
  createdAt: z.string(),
  lastUsedAt: z.string().nullable().describe('To the minute'),
  revokedAt: z.string().nullable(),
});
export type StationToken = z.output<typeof stationTokenSchema>;

const path = '/api/v1/networks/{network}/stations/{code}/tokens';
const params = z.object({ network: z.string(), code: z.string() });
const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });

registerRoute({
  access: 'person',
  method: 'get',
  path,
  summary: 'Tokens of a station, newest first, without their secrets (operator)',
  request: { params },
  responses: {
    200: {
      description: 'All of them, revoked ones too',
      ...jsonOf(z.object({ items: z.array(stationTokenSchema), next: z.null() })),
    },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path,
  summary: 'Make a further token for a station (operator); others stay in force',
  request: { params, body: jsonOf(newStationTokenSchema) },
  responses: {
    201: {
      description: 'The token, shown this once; the body may be left out',
      ...jsonOf(z.object({ id: z.number().int(), token: z.string() })),
    },
  },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: `${path}/{id}`,
  summary: 'Revoke a token of a station at once (operator)',
  request: { params: params.extend({ id: z.string() }) },
  responses: { 204: { description: 'Revoked' } },
});
