import { z } from 'zod';
import { emailAddress } from './common';
import { membershipSchema, MOST_ROLES, newPersonSchema } from './people';
import { registerRoute } from './registry';

export const newInvitationSchema = newPersonSchema.omit({ password: true });
export type NewInvitation = z.output<typeof newInvitationSchema>;

const invitationSchema = z.object({
  id: z.number().int(),
  email: z.string(),
  name: z.string(),
  isAdministrator: z.boolean(),
  roles: z.array(membershipSchema).max(MOST_ROLES),
  invitedBy: z.string().nullable(),
  createdAt: z.string(),
  expiresAt: z.string().describe('Sending it again moves it on'),
  lastMailAt: z.string().nullable(),
});
export type InvitationEntry = z.output<typeof invitationSchema>;

/** What a link carries; anything else is none of ours. */
const linkToken = z.string().min(1, 'must not be empty').max(200);
/** Judged by the rules for passwords, which know whose it is. */
const chosenPassword = z.string().min(1, 'must not be empty').max(5000, 'must have at most 1,000 characters');

export const linkPasswordSchema = z.object({ token: linkToken, password: chosenPassword });
export type LinkPassword = z.output<typeof linkPasswordSchema>;
export const passwordLinkSchema = z.object({ email: z.string().trim().pipe(emailAddress) });

const jsonOf = (schema: z.ZodType) => ({ content: { 'application/json': { schema } } });
const params = z.object({ id: z.string() });

registerRoute({
  access: 'person',
  method: 'get',
  path: '/api/v1/invitations',
  summary: 'Invitations neither accepted nor withdrawn, latest first (administrator)',
  responses: {
    200: { description: 'All', ...jsonOf(z.object({ items: z.array(invitationSchema), next: z.null() })) },
  },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/invitations',
  summary: 'Invite somebody by e-mail, with roles (administrator, not with an access token)',
  request: { body: jsonOf(newInvitationSchema) },
  responses: { 201: { description: 'Invited', ...jsonOf(z.object({ id: z.number().int() })) } },
});
registerRoute({
  access: 'person',
  method: 'delete',
  path: '/api/v1/invitations/{id}',
  summary:
    'Withdraw an invitation: its links open nothing any more (administrator, not with an access token)',
  request: { params },
  responses: { 204: { description: 'Withdrawn' } },
});
registerRoute({
  access: 'person',
  method: 'post',
  path: '/api/v1/invitations/{id}/mails',
  summary:
    'Send an invitation again; earlier links open nothing any more (administrator, not with an access token)',
  request: { params },
  responses: { 204: { description: 'On its way' } },
});
registerRoute({
  access: 'anyone',
  method: 'post',
  path: '/api/v1/invitations/acceptance',
  summary:
    'Accept the invitation that a mailed link names, with a password; the session cookie comes with the answer',
  request: { body: jsonOf(linkPasswordSchema) },
  responses: { 204: { description: 'Joined, and signed in' } },
});
registerRoute({
  access: 'anyone',
  method: 'post',
  path: '/api/v1/password-links',
  summary: 'Have a link to choose a new password mailed; the answer is the same for every address',
  request: { body: jsonOf(passwordLinkSchema) },
  responses: { 202: { description: 'If the address is somebody’s, a message is on its way' } },
});
registerRoute({
  access: 'anyone',
  method: 'post',
  path: '/api/v1/password-links/use',
  summary: 'Choose a new password by a mailed link; every session ends',
  request: { body: jsonOf(linkPasswordSchema) },
  responses: { 204: { description: 'Changed' } },
});
