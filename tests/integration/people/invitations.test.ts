import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { deliverMails, meStatus, signInStatus, tokenIn } from './support';

useFreshSchema();

const PASSWORD = 'nine grey geese over water';
let administrator: { userId: string; session: string };

beforeAll(async () => {
  await makeNetwork('home');
  administrator = await makePerson(null, [], true);
});

const admin = (method: string, path: string, body?: object) =>
  callApi(method, path, { session: administrator.session, ...(body && { body }) });

async function inviteOne(email: string): Promise<{ id: number; token: string }> {
  const roles = [{ network: 'home', role: 'liaison' }];
  const invited = await admin('POST', '/api/v1/invitations', { name: 'Ines Valcourt', email, roles });
  expect(invited.status).toBe(201);
  const { id } = await invited.json();
  return { id, token: tokenIn((await deliverMails()).find(({ to }) => to === email)) };
}

const accept = (token: string, password = PASSWORD, jar = new Map<string, string>()) =>
  callApi('POST', '/api/v1/invitations/acceptance', { body: { token, password }, jar });

test('somebody invited chooses a password, is in with the roles, and the link is over', async () => {
  const email = 'ines@people.example';
  const { token } = await inviteOne(email);
  expect(token).toMatch(/^[\w-]{43}$/);
  for (const table of ['outbox', 'account_tokens', 'invitations', 'audit_log']) {
    expect(JSON.stringify(await db()(table).select('*')), table).not.toContain(token);
  }
  const named = await accept(token, 'Valcourt-home-1234');
  expect(named.status).toBe(422);
  expect(await named.json()).toMatchObject({ fields: [{ field: 'password' }] });

  const jar = new Map<string, string>();
  expect((await accept(token, PASSWORD, jar)).status).toBe(204);
  const me = await callApi('GET', '/api/v1/me', { jar });
  expect(await me.json()).toMatchObject({ email, networks: [{ slug: 'home', roles: ['liaison'] }] });
  expect(await signInStatus(email, PASSWORD)).toBe(204);
  const again = await accept(token);
  expect(again.status).toBe(410);
  expect(await again.json()).toMatchObject({ code: 'link-over' });
  const open = await (await admin('GET', '/api/v1/invitations')).json();
  expect(open.items).toEqual([]);
});

test('sent again, the earlier link is over; withdrawn, every link is, even one still to be sent', async () => {
  const email = 'jon@people.example';
  const { id, token } = await inviteOne(email);
  expect((await admin('POST', `/api/v1/invitations/${id}/mails`)).status).toBe(204);
  const second = tokenIn((await deliverMails())[0]);
  expect(second).not.toBe(token);
  expect((await accept(token)).status).toBe(410);

  expect((await admin('POST', `/api/v1/invitations/${id}/mails`)).status).toBe(204);
  expect((await admin('DELETE', `/api/v1/invitations/${id}`)).status).toBe(204);
  expect(await deliverMails()).toEqual([]);
  expect((await accept(second)).status).toBe(410);
  expect((await admin('DELETE', `/api/v1/invitations/${id}`)).status).toBe(404);
});

test('accepted twice at the same moment it makes one person', async () => {
  const email = 'twice@people.example';
  const { token } = await inviteOne(email);
  const answers = await Promise.all([accept(token), accept(token)]);
  expect(answers.map(({ status }) => status).sort()).toEqual([204, 410]);
  expect(await db()('users').where({ email })).toHaveLength(1);
});

test('it runs out, and nobody is asked twice or asked who is here', async () => {
  const email = 'late@people.example';
  const { id, token } = await inviteOne(email);
  const twice = await admin('POST', '/api/v1/invitations', { name: 'Late', email });
  expect(twice.status).toBe(422);
  await db()('account_tokens').update({ expires_at: new Date(Date.now() - 1000) });
  expect((await accept(token)).status).toBe(410);
  expect((await admin('POST', `/api/v1/invitations/${id}/mails`)).status).toBe(204);
  expect((await accept(tokenIn((await deliverMails())[0]))).status).toBe(204);
  const taken = await admin('POST', '/api/v1/invitations', { name: 'Late', email });
  expect(await taken.json()).toMatchObject({ status: 422, fields: [{ field: 'email' }] });
});

test('nobody but an administrator in a browser invites', async () => {
  const body = { name: 'A', email: 'a@people.example', isAdministrator: true };
  const { session } = await makePerson(1, ['operator']);
  expect((await callApi('POST', '/api/v1/invitations', { session, body })).status).toBe(403);
  const made = await admin('POST', '/api/v1/me/tokens', { name: 'script', days: 7 });
  const { token } = await made.json();
  expect(await meStatus({ token })).toBe(200);
  expect((await callApi('POST', '/api/v1/invitations', { token, body })).status).toBe(403);
});
