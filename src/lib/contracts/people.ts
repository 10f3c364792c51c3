import { z } from 'zod';
import { emailAddress, shortText } from './common';
import { registerRoute } from './registry';

export const ROLES = ['operator', 'liaison', 'regulator'] as const;

export const signInSchema = z.object({
  email: z.string().trim().min(1, 'must not be empty').max(254),
  password: z.string().min(1, 'must not be empty').max(1000),
});

export const newPasswordSchema = z
  .string()
  .min(12, 'must have at least 12 characters')
  .max(1000, 'must have at most 1,000 characters');

/** A role in a network, by its slug. */
export const membershipSchema = z.object({ network: z.string(), role: z.enum(ROLES) });

export const newPersonSchema = z.object({
  name: shortText,
  email: emailAddress,
  isAdministrator: z.boolean().default(false),
  roles: z.array(membershipSchema).default([]),
});
export type NewPerson = z.output<typeof newPersonSchema>;

export const personChangesSchema = z.object({
  name: shortText,
  isAdministrator: z.boolean(),
  roles: z.array(membershipSchema),
});
export type PersonChanges = z.output<typeof personChangesSchema>;

/** How long an access token may hold, in days. */
export const ACCESS_TOKEN_DAYS = [7, 30, 90, 365] as const;
export const newAccessTokenSchema = z.object({
  name: shortText,
  days: z
    .number()
    .refine((days) => (ACCESS_TOKEN_DAYS as readonly number[]).includes(days), 'must be one of the choices'),
});

export const meSchema = z.object({
  name: z.string(),
  email: z.string(),
  isAdministrator: z.boolean(),
  networks: z.array(z.object({ slug: z.string(), name: z.string(), roles: z.array(z.enum(ROLES)) })),
});
export type Me = z.output<typeof meSchema>;

const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/me',
  summary: 'Who the caller is, with the roles held in each network',
  responses: { 200: { description: 'The person', ...jsonOf(meSchema) } },
});
registerRoute({
  access: 'anyone',
  method: 'post',
  path: '/api/v1/session',
  summary: 'Sign in; the session cookie comes with the answer',
  request: { body: jsonOf(signInSchema) },
  responses: { 204: { description: 'Signed in' } },
});
registerRoute({
  access: 'anyone',
  method: 'delete',
  path: '/api/v1/session',
  summary: 'Sign out',
  responses: { 204: { description: 'Signed out, or was not signed in' } },
});
