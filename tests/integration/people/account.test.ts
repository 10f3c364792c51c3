import { beforeAll, describe, expect, test } from 'vitest';
import { startSession } from '#lib/auth/sessions';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { givePassword, meStatus, signInStatus } from './support';

useFreshSchema();

const OLD = 'a heron in the reeds';
const NEW = 'two herons in the reeds';

let networkId: number;

beforeAll(async () => {
  networkId = await makeNetwork('home');
});

const changeOwn = (session: string, currentPassword: string, newPassword: string) =>
  callApi('POST', '/api/v1/me/password', { session, body: { currentPassword, newPassword } });

describe('one’s own password', () => {
  test('changes with the current one only, and ends the sessions elsewhere', async () => {
    const { userId, session } = await makePerson(networkId, ['operator']);
    const email = await givePassword(userId, OLD);
    const elsewhere = (await startSession(userId)).value;

    const wrong = await changeOwn(session, 'not the one at all', NEW);
    expect(wrong.status).toBe(422);
    expect(await wrong.json()).toMatchObject({ fields: [{ field: 'currentPassword' }] });
    expect((await changeOwn(session, OLD, 'short')).status).toBe(422);
    expect((await changeOwn(session, OLD, OLD)).status).toBe(422);
    expect(await meStatus({ session: elsewhere })).toBe(200);

    expect((await changeOwn(session, OLD, NEW)).status).toBe(204);
    expect(await meStatus({ session })).toBe(200);
    expect(await meStatus({ session: elsewhere })).toBe(401);
    expect(await signInStatus(email, OLD)).toBe(401);
    expect(await signInStatus(email, NEW)).toBe(204);
  });

  test('cannot be guessed from an open browser', async () => {
    const { userId, session } = await makePerson(networkId, ['operator']);
    await givePassword(userId, OLD);
    for (let n = 0; n < 10; n += 1)
      expect((await changeOwn(session, `guess number ${n}`, NEW)).status).toBe(422);
    const answer = await changeOwn(session, OLD, NEW);
    expect(answer.status).toBe(429);
    expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0);
  });
});

describe('sessions', () => {
  test('tell from where they come, and one that is ended is out at once', async () => {
    const { userId, session } = await makePerson(networkId, ['liaison']);
    const other = await startSession(userId, { address: '192.0.2.7', agent: 'Field tablet' });
    const listed = await (await callApi('GET', '/api/v1/me/sessions', { session })).json();
    expect(listed.items).toHaveLength(2);
    const [mine, theirs] = [true, false].map((isThisOne) =>
      listed.items.find((item: { isThisOne: boolean }) => item.isThisOne === isThisOne),
    );
    expect(mine).toMatchObject({ address: null });
    expect(theirs).toMatchObject({ address: '192.0.2.7', agent: 'Field tablet' });

    const stranger = await makePerson(networkId, ['liaison']);
    const path = `/api/v1/me/sessions/${theirs.id}`;
    expect((await callApi('DELETE', path, { session: stranger.session })).status).toBe(404);
    expect(await meStatus({ session: other.value })).toBe(200);
    expect((await callApi('DELETE', path, { session })).status).toBe(204);
    expect(await meStatus({ session: other.value })).toBe(401);
    expect(await meStatus({ session })).toBe(200);
  });

  test('all others end together', async () => {
    const { userId, session } = await makePerson(networkId, ['liaison']);
    const others = [await startSession(userId), await startSession(userId)];
    const answer = await callApi('DELETE', '/api/v1/me/sessions', { session });
    expect(await answer.json()).toEqual({ ended: 2 });
    for (const { value } of others) expect(await meStatus({ session: value })).toBe(401);
    expect(await meStatus({ session })).toBe(200);
  });
});

test('an access token opens what its person may, tells its last use, and nothing once revoked', async () => {
  const { session } = await makePerson(networkId, ['regulator']);
  const made = await callApi('POST', '/api/v1/me/tokens', { session, body: { name: 'report', days: 30 } });
  expect(made.status).toBe(201);
  const { token } = await made.json();
  expect((await callApi('GET', '/api/v1/networks/home', { token })).status).toBe(200);
  expect((await callApi('GET', '/api/v1/me/sessions', { token })).status).toBe(403);

  const listed = await callApi('GET', '/api/v1/me/tokens', { session });
  const text = await listed.text();
  expect(text).not.toContain(token);
  const [entry] = JSON.parse(text).items;
  expect(entry).toMatchObject({ name: 'report', revokedAt: null, lastUsedAt: expect.any(String) });

  const stranger = await makePerson(networkId, ['regulator']);
  const path = `/api/v1/me/tokens/${entry.id}`;
  expect((await callApi('DELETE', path, { session: stranger.session })).status).toBe(404);
  expect((await callApi('DELETE', path, { session })).status).toBe(204);
  expect(await meStatus({ token })).toBe(401);
  const odd = await callApi('POST', '/api/v1/me/tokens', { session, body: { name: 'x', days: 36_500 } });
  expect(odd.status).toBe(422);
});
