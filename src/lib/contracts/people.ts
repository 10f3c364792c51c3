import { z } from 'zod';
import { emailAddress, shortText } from './common';
import { registerRoute } from './registry';

export const ROLES = ['operator', 'liaison', 'regulator'] as const;

/** A password exactly as it was given: nothing is cut off or folded. The rules for new ones know whose it is, and are judged later. */
const givenPassword = z.string().min(1, 'must not be empty').max(5000, 'must have at most 1,000 characters');

export const signInSchema = z.object({
  email: z.string().trim().min(1, 'must not be empty').max(254),
  password: givenPassword,
  code: z
    .string()
    .trim()
    .max(100)
    .optional()
    .describe('Of the authenticator, or a recovery code: asked for with the problem `second-factor-needed`'),
});

/** A role in a network, by its slug. */
export const membershipSchema = z.object({ network: z.string(), role: z.enum(ROLES) });
export type RoleGiven = z.output<typeof membershipSchema>;

export const MOST_ROLES = 3000;

export const newPersonSchema = z.object({
  name: shortText,
  email: emailAddress,
  isAdministrator: z.boolean().default(false),
  roles: z.array(membershipSchema).max(MOST_ROLES).default([]),
  password: givenPassword.optional().describe('Left out, one is made and answered once'),
});
export type NewPerson = z.output<typeof newPersonSchema>;

export const personChangesSchema = z.object({
  name: shortText,
  isAdministrator: z.boolean(),
  roles: z.array(membershipSchema).max(MOST_ROLES),
});
export type PersonChanges = z.output<typeof personChangesSchema>;

/** What is left out stays. */
export const personPatchSchema = personChangesSchema
  .partial()
  .extend({ disabled: z.boolean().optional().describe('True: no sign-in, no token, every session over') })
  .strict()
  .refine(
    (patch) => patch.disabled === undefined || Object.keys(patch).length === 1,
    'disabled must be sent alone',
  );
export type PersonPatch = z.output<typeof personPatchSchema>;

export const ownPasswordChangeSchema = z.object({
  currentPassword: givenPassword,
  newPassword: givenPassword,
});
export type OwnPasswordChange = z.output<typeof ownPasswordChangeSchema>;

export const passwordResetSchema = z.object({
  password: givenPassword.optional().describe('Left out, one is made and answered once'),
});

const meSchema = z.object({
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

export const personSchema = z.object({
  id: z.string(),
  name: z.string(),
  email: z.string(),
  isAdministrator: z.boolean(),
  createdAt: z.string(),
  disabledAt: z.string().nullable(),
  hasSecondFactor: z.boolean(),
  roles: z.array(membershipSchema),
});
export type PersonEntry = z.output<typeof personSchema>;

const onePerson = z.object({ person: personSchema });
const madePassword = z.string().nullable().describe('Told this once; null where the caller chose it');
const params = z.object({ id: z.string() });

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/people',
  summary: 'Everybody by name, disabled people too (administrator)',
  responses: {
    200: { description: 'All', ...jsonOf(z.object({ items: z.array(personSchema), next: z.null() })) },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/people',
  summary: 'Add a person with roles (administrator, not with an access token)',
  request: { body: jsonOf(newPersonSchema) },
  responses: {
    201: { description: 'The person', ...jsonOf(onePerson.extend({ password: madePassword })) },
  },
});
registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/people/{id}',
  summary: 'A person with the roles held in each network (administrator)',
  request: { params },
  responses: { 200: { description: 'The person', ...jsonOf(onePerson) } },
});
registerRoute({
  access: 'person',
  method: 'patch',
  path: '/api/v1/people/{id}',
  summary: 'Change name, roles, administration, or disable (administrator, not with an access token)',
  request: { params, body: jsonOf(personPatchSchema) },
  responses: { 200: { description: 'The person as it is now', ...jsonOf(onePerson) } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/people/{id}/password',
  summary:
    'Give a person a new password; every session of theirs ends (administrator, not with an access token)',
  request: { params, body: jsonOf(passwordResetSchema) },
  responses: { 200: { description: 'Done', ...jsonOf(z.object({ password: madePassword })) } },
});
