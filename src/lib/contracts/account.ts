import { z } from 'zod';
import { accessTokenSchema, newAccessTokenSchema } from './accessTokens';
import { ownPasswordChangeSchema } from './people';
import { registerRoute } from './registry';

const sessionSchema = z.object({
  id: z.string(),
  createdAt: z.string(),
  lastSeenAt: z.string().describe('To the minute'),
  expiresAt: z.string(),
  address: z.string().nullable(),
  agent: z.string().nullable(),
  isThisOne: z.boolean(),
});
export type OpenSession = z.output<typeof sessionSchema>;

const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const listOf = (schema: z.ZodType) => jsonOf(z.object({ items: z.array(schema), next: z.null() }));

registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/me/password',
  summary: 'Change the caller’s own password; every other session ends (not with an access token)',
  request: { body: jsonOf(ownPasswordChangeSchema) },
  responses: { 204: { description: 'Changed' } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/me/sessions',
  summary: 'The caller’s open sessions, newest first (not with an access token)',
  responses: { 200: { description: 'All of them', ...listOf(sessionSchema) } },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: '/api/v1/me/sessions',
  summary: 'End every session of the caller but this one',
  responses: {
    200: { description: 'How many ended', ...jsonOf(z.object({ ended: z.number().int() })) },
  },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: '/api/v1/me/sessions/{id}',
  summary: 'End one session of the caller',
  request: { params: z.object({ id: z.string() }) },
  responses: { 204: { description: 'Ended' } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/me/tokens',
  summary: 'The caller’s access tokens, newest first, ended ones too',
  responses: { 200: { description: 'All of them', ...listOf(accessTokenSchema) } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/me/tokens',
  summary:
    'Make an access token with the caller’s roles, as far as its scope goes (not with an access token)',
  request: { body: jsonOf(newAccessTokenSchema) },
  responses: {
    201: { description: 'The token, told this once', ...jsonOf(z.object({ token: z.string() })) },
  },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: '/api/v1/me/tokens/{id}',
  summary: 'End an access token of the caller at once',
  request: { params: z.object({ id: z.string() }) },
  responses: { 204: { description: 'Ended' } },
});
