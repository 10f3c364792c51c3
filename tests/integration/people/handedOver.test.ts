import { Secret, TOTP } from 'otpauth';
import { beforeAll, describe, expect, test } from 'vitest';
import { pool } from '#db/queries/connection';
import { ensureFirstAdministrator } from '#ops/start/firstAdministrator';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { givePassword, signInStatus } from './support';

useFreshSchema();

const OWN = 'nine grey geese over water';
const CHOSEN = 'a heron in the reeds';
let administrator: string;

beforeAll(async () => {
  await makeNetwork('home');
  administrator = (await makePerson(null, [], true)).session;
});

/** Adds a person by the interface, with a password made there. */
async function added(email: string): Promise<{ id: string; password: string }> {
  const body = { name: 'Ines', email, roles: [{ network: 'home', role: 'operator' }] };
  const answer = await callApi('POST', '/api/v1/people', { session: administrator, body });
  const { person, password } = await answer.json();
  return { id: person.id, password };
}

async function signedIn(email: string, password: string, code?: string): Promise<string> {
  const jar = new Map<string, string>();
  const answer = await callApi('POST', '/api/v1/session', { body: { email, password, code }, jar });
  expect(answer.status).toBe(204);
  return jar.get('bittern-session') ?? '';
}

async function answerOf(method: string, path: string, call: Parameters<typeof callApi>[2]) {
  const answer = await callApi(method, path, call);
  const text = await answer.text();
  return { status: answer.status, code: text.startsWith('{') ? JSON.parse(text).code : undefined };
}

const CLOSED = { status: 403, code: 'password-first' };
const change = (session: string, currentPassword: string, newPassword = OWN) =>
  callApi('POST', '/api/v1/me/password', { session, body: { currentPassword, newPassword } });

describe('a password that an administrator hands over', () => {
  test('opens nothing until it is changed, and nothing afterwards', async () => {
    const { password } = await added('routes@people.example');
    const session = await signedIn('routes@people.example', password);
    expect(await answerOf('GET', '/api/v1/networks/home', { session })).toEqual(CLOSED);
    expect((await change(session, password)).status).toBe(204);
    expect((await answerOf('GET', '/api/v1/networks/home', { session })).status).toBe(200);
    expect(await signInStatus('routes@people.example', password)).toBe(401);
  });

  test('cannot be kept, and signing out needs no change', async () => {
    const { password } = await added('kept@people.example');
    const session = await signedIn('kept@people.example', password);
    expect((await change(session, password, password)).status).toBe(422);
    expect((await change(session, 'not the one at all')).status).toBe(422);
    expect(await answerOf('GET', '/api/v1/me', { session })).toEqual(CLOSED);
    expect((await callApi('DELETE', '/api/v1/session', { session })).status).toBe(204);
    expect(await answerOf('GET', '/api/v1/me', { session })).toMatchObject({ status: 401 });
  });

  test('given anew is closed again; tokens made before go on, and a second factor is asked for as before', async () => {
    const { userId, session } = await makePerson(null, [], true);
    const email = await givePassword(userId, CHOSEN);
    const made = await callApi('POST', '/api/v1/me/tokens', { session, body: { name: 'script', days: 7 } });
    const { token } = await made.json();
    const begun = await callApi('POST', '/api/v1/me/second-factor', { session });
    const totp = new TOTP({ secret: Secret.fromBase32((await begun.json()).secret.replace(/\s/g, '')) });
    const codeIn = (steps: number) => totp.generate({ timestamp: Date.now() + steps * 30_000 });
    const confirmed = await callApi('POST', '/api/v1/me/second-factor/confirmation', {
      session,
      body: { code: codeIn(-1) },
    });
    expect(confirmed.status).toBe(200);

    const reset = await callApi('POST', `/api/v1/people/${userId}/password`, {
      session: administrator,
      body: {},
    });
    const { password } = await reset.json();
    expect(await signInStatus(email, password)).toBe(401);
    const anew = await signedIn(email, password, codeIn(0));
    expect(await answerOf('GET', '/api/v1/people', { session: anew })).toEqual(CLOSED);
    expect((await answerOf('GET', '/api/v1/networks/home', { token })).status).toBe(200);

    expect((await change(anew, password)).status).toBe(204);
    expect((await answerOf('GET', '/api/v1/people', { session: anew })).status).toBe(200);
    expect(await signInStatus(email, OWN)).toBe(401);
    await signedIn(email, OWN, codeIn(1));
  });
});

test.each([true, false])(
  'the first administrator changes the password where it is asked: %s',
  async (asked) => {
    const email = `first-${asked}@people.example`;
    await ensureFirstAdministrator({ email, password: CHOSEN, changesPassword: asked });
    const session = await signedIn(email, CHOSEN);
    const { status } = await answerOf('GET', '/api/v1/people', { session });
    expect(status).toBe(asked ? 403 : 200);
    const [flag] = await pool()('users').where({ email }).pluck('must_change_password');
    expect(flag).toBe(asked ? 1 : 0);
  },
);
