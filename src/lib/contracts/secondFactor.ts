import { z } from 'zod';
import { registerRoute } from './registry';

export const factorCodeSchema = z.object({ code: z.string().trim().min(1, 'must not be empty').max(100) });
export const factorEndSchema = z.object({ password: z.string().min(1, 'must not be empty').max(5000) });

const factorStateSchema = z.object({
  isOn: z.boolean(),
  isRequired: z.boolean().describe('A network of the caller lets nobody in from a browser without one'),
  recoveryCodesLeft: z.number().int(),
});
export type FactorState = z.output<typeof factorStateSchema>;

export const signInRulesSchema = z
  .object({
    secondFactorRequired: z
      .boolean()
      .describe('True: nobody is let in from a browser without a second factor'),
  })
  .strict();
export type SignInRules = z.output<typeof signInRulesSchema>;

const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const codes = z.object({ recoveryCodes: z.array(z.string()).describe('Told this once') });

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/me/second-factor',
  summary: 'Whether the caller signs in with a second factor (not with an access token)',
  responses: { 200: { description: 'How it stands', ...jsonOf(factorStateSchema) } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/me/second-factor',
  summary: 'Begin a second factor: the secret of an authenticator (not with an access token)',
  responses: {
    201: {
      description: 'The secret; it holds once a code of it was given',
      ...jsonOf(z.object({ secret: z.string(), uri: z.string() })),
    },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/me/second-factor/confirmation',
  summary: 'Give the first code of a new second factor: from now on signing in asks for one',
  request: { body: jsonOf(factorCodeSchema) },
  responses: { 200: { description: 'The recovery codes', ...jsonOf(codes) } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/me/second-factor/recovery-codes',
  summary: 'Make new recovery codes, with a current code; the earlier ones open nothing any more',
  request: { body: jsonOf(factorCodeSchema) },
  responses: { 200: { description: 'The recovery codes', ...jsonOf(codes) } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/me/second-factor/end',
  summary:
    'Sign in by password alone from now on, with the password; refused where a network requires the factor',
  request: { body: jsonOf(factorEndSchema) },
  responses: { 204: { description: 'Ended' } },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: '/api/v1/people/{id}/second-factor',
  summary: 'Take somebody’s second factor away; the person is told (administrator, not with an access token)',
  request: { params: z.object({ id: z.string() }) },
  responses: { 204: { description: 'Taken away' } },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/networks/{network}/sign-in-rules',
  summary: 'What signing in to a network asks for',
  request: { params: z.object({ network: z.string() }) },
  responses: { 200: { description: 'The rules', ...jsonOf(signInRulesSchema) } },
});
registerRoute({
  access: 'person',
  method: 'put',
  path: '/api/v1/networks/{network}/sign-in-rules',
  summary: 'Say what signing in to a network asks for (administrator, not with an access token)',
  request: { params: z.object({ network: z.string() }), body: jsonOf(signInRulesSchema) },
  responses: { 200: { description: 'The rules', ...jsonOf(signInRulesSchema) } },
});
