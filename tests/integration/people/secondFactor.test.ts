import { Secret, TOTP } from 'otpauth';
import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { deliverMails, givePassword, meStatus } from './support';

useFreshSchema();

const PASSWORD = 'a heron in the reeds';
let homeId: number;
let administrator: { userId: string; session: string };

beforeAll(async () => {
  homeId = await makeNetwork('home');
  await makeNetwork('strict');
  administrator = await makePerson(null, [], true);
});

/** The code of a secret, `steps` of 30 s from now. */
function codeOf(secret: string, steps: number): string {
  const totp = new TOTP({ secret: Secret.fromBase32(secret.replaceAll(' ', '')) });
  return totp.generate({ timestamp: Date.now() + steps * 30_000 });
}

const factor = (session: string, path = '', body: object = {}) =>
  callApi('POST', `/api/v1/me/second-factor${path}`, { session, body });

async function setUp(session: string): Promise<{ secret: string; recoveryCodes: string[] }> {
  const begun = await factor(session);
  expect(begun.status).toBe(201);
  const { secret } = await begun.json();
  const confirmed = await factor(session, '/confirmation', { code: codeOf(secret, -1) });
  expect(confirmed.status).toBe(200);
  return { secret, ...(await confirmed.json()) };
}

async function signInCode(email: string, code?: string, jar?: Map<string, string>) {
  const body = { email, password: PASSWORD, ...(code && { code }) };
  const answer = await callApi('POST', '/api/v1/session', { body, ...(jar && { jar }) });
  return answer.status === 204 ? 'in' : ((await answer.json()) as { code: string }).code;
}

async function makeMember(network = homeId) {
  const person = await makePerson(network, ['operator']);
  return { ...person, email: await givePassword(person.userId, PASSWORD) };
}

describe('a second factor', () => {
  test('is asked for once its first code was given; no code and no recovery code holds twice', async () => {
    const { userId, session, email } = await makeMember();
    const begun = await (await factor(session)).json();
    expect(await signInCode(email)).toBe('in');
    const wrong = await factor(session, '/confirmation', { code: '000000' });
    expect(wrong.status).toBe(422);
    const confirmed = await factor(session, '/confirmation', { code: codeOf(begun.secret, -1) });
    const { recoveryCodes } = await confirmed.json();
    expect(recoveryCodes).toHaveLength(10);

    const stored = JSON.stringify(await db()('second_factors').where({ user_id: userId }));
    for (const secret of [begun.secret.replaceAll(' ', ''), ...recoveryCodes]) {
      expect(stored).not.toContain(secret);
    }
    expect(await signInCode(email)).toBe('second-factor-needed');
    expect(await signInCode(email, codeOf(begun.secret, -1))).toBe('wrong-code');
    const now = codeOf(begun.secret, 0);
    expect(await signInCode(email, now)).toBe('in');
    expect(await signInCode(email, now)).toBe('wrong-code');
    expect(await signInCode(email, recoveryCodes[3].toUpperCase().replaceAll('-', ' '))).toBe('in');
    expect(await signInCode(email, recoveryCodes[3])).toBe('wrong-code');
    const told = (await deliverMails()).filter(({ to }) => to === email).map(({ subject }) => subject);
    expect(told).toEqual(expect.arrayContaining(['Second factor set up', 'A recovery code was used']));
  });

  test('new recovery codes end the earlier ones; it goes with the password alone', async () => {
    const { session, email } = await makeMember();
    const { secret, recoveryCodes } = await setUp(session);
    const made = await factor(session, '/recovery-codes', { code: codeOf(secret, 0) });
    expect(made.status).toBe(200);
    expect(await signInCode(email, recoveryCodes[0])).toBe('wrong-code');
    expect((await factor(session)).status).toBe(409);
    expect((await factor(session, '/end', { password: 'not the one at all' })).status).toBe(422);
    expect((await factor(session, '/end', { password: PASSWORD })).status).toBe(204);
    expect(await signInCode(email)).toBe('in');
  });

  test('guesses of a code are slowed down, and whoever is at a known browser is not', async () => {
    const { session, email } = await makeMember();
    const own = new Map<string, string>();
    expect(await signInCode(email, undefined, own)).toBe('in');
    const { secret } = await setUp(session);
    const outcomes: string[] = [];
    for (let n = 0; n < 6; n += 1) outcomes.push(await signInCode(email, '123456'));
    expect(outcomes).toEqual([...Array<string>(5).fill('wrong-code'), 'too-many-attempts']);
    expect(await signInCode(email, codeOf(secret, 0), own)).toBe('in');
  });
});

describe('a network that requires one', () => {
  const strict = '/api/v1/networks/strict';
  const require = (isRequired: boolean, session = administrator.session) =>
    callApi('PUT', `${strict}/sign-in-rules`, { session, body: { secondFactorRequired: isRequired } });

  test('is closed to members without it, not to their tokens, and nothing else is', async () => {
    const strictId = (await db()('networks').where({ slug: 'strict' }).first('id')).id as number;
    const member = await makeMember(strictId);
    const made = await callApi('POST', '/api/v1/me/tokens', {
      session: member.session,
      body: { name: 'before', days: 7 },
    });
    const { token } = await made.json();
    const read = (call: object, path = strict) => callApi('GET', path, call);

    expect((await require(true, member.session)).status).toBe(403);
    const own = await require(true);
    expect(await own.json()).toMatchObject({ status: 409, code: 'own-factor-first' });
    await setUp(administrator.session);
    expect((await require(true)).status).toBe(200);

    const refused = await read({ session: member.session });
    expect(await refused.json()).toMatchObject({ status: 403, code: 'second-factor-first' });
    const stations = await read({ session: member.session }, `${strict}/stations`);
    expect(await stations.json()).toMatchObject({ code: 'second-factor-first' });
    const listed = await (await read({ session: member.session }, '/api/v1/networks')).json();
    expect(listed.items).toEqual([]);
    expect((await read({ token })).status).toBe(200);
    const another = { session: member.session, body: { name: 'after', days: 7 } };
    expect((await callApi('POST', '/api/v1/me/tokens', another)).status).toBe(403);
    expect(await meStatus({ session: member.session })).toBe(200);

    const stranger = await makeMember();
    expect((await read({ session: stranger.session })).status).toBe(404);
    expect((await read({ session: stranger.session }, '/api/v1/networks/home')).status).toBe(200);

    const bare = await makePerson(null, [], true);
    expect((await read({ session: bare.session }, '/api/v1/people')).status).toBe(403);
    expect((await require(false, bare.session)).status).toBe(403);

    await setUp(member.session);
    expect((await read({ session: member.session })).status).toBe(200);
    const kept = await factor(member.session, '/end', { password: PASSWORD });
    expect(await kept.json()).toMatchObject({ status: 409, code: 'required' });
    expect((await require(false)).status).toBe(200);
    expect((await factor(member.session, '/end', { password: PASSWORD })).status).toBe(204);
  });
});

test('an administrator takes a lost one away: told to the person, and kept in the trail', async () => {
  const { userId, session, email } = await makeMember();
  await setUp(session);
  const path = `/api/v1/people/${userId}/second-factor`;
  expect((await callApi('DELETE', path, { session })).status).toBe(403);
  await deliverMails();
  expect((await callApi('DELETE', path, { session: administrator.session })).status).toBe(204);
  expect((await callApi('DELETE', path, { session: administrator.session })).status).toBe(404);
  expect(await signInCode(email)).toBe('in');
  expect((await deliverMails()).map(({ to, subject }) => [to, subject])).toContainEqual([
    email,
    'Second factor taken away',
  ]);
  const acts = await db()('audit_log').where({ action: 'second-factor.reset' });
  expect(acts).toMatchObject([{ user_id: administrator.userId, subject: `person ${userId}` }]);
});
