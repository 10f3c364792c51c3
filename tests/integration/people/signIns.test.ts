import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { sessionDigest } from '#db/queries/sessions';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { deliverMails, givePassword, meStatus } from './support';

useFreshSchema();

const PASSWORD = 'a heron in the reeds';
const FIREFOX = 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0';
let networkId: number;

beforeAll(async () => {
  networkId = await makeNetwork('home');
});

async function person(): Promise<{ email: string; session: string }> {
  const { userId, session } = await makePerson(networkId, ['operator']);
  return { email: await givePassword(userId, PASSWORD), session };
}

const signIn = (email: string, clientAddress: string, jar = new Map<string, string>(), password = PASSWORD) =>
  callApi('POST', '/api/v1/session', {
    body: { email, password },
    clientAddress,
    jar,
    headers: { 'user-agent': FIREFOX },
  });

test('a stranger’s guesses slow the stranger down, and never the owner elsewhere or at the own browser', async () => {
  const { email } = await person();
  const own = new Map<string, string>();
  expect((await signIn(email, '192.0.2.1', own)).status).toBe(204);
  const statuses: number[] = [];
  for (let n = 0; n < 7; n += 1) {
    statuses.push((await signIn(email, '192.0.2.1', undefined, `guess number ${n}`)).status);
  }
  expect(statuses).toEqual([401, 401, 401, 401, 401, 429, 429]);
  const waiting = await signIn(email, '192.0.2.1');
  expect(waiting.status).toBe(429);
  expect(Number(waiting.headers.get('retry-after'))).toBeGreaterThan(0);
  expect((await signIn(email, '192.0.2.1', own)).status).toBe(204);
  expect((await signIn(email, '198.51.100.7')).status).toBe(204);
});

test('somebody else’s browser cookie buys no budget', async () => {
  const { email } = await person();
  const stranger = await person();
  const theirs = new Map<string, string>();
  expect((await signIn(stranger.email, '192.0.2.2', theirs)).status).toBe(204);
  for (let n = 0; n < 5; n += 1) await signIn(email, '192.0.2.2', theirs, `guess number ${n}`);
  expect((await signIn(email, '192.0.2.2', theirs)).status).toBe(429);
});

test('a sign-in from a new place is told by e-mail, one from a usual place is not', async () => {
  const { email } = await person();
  const jar = new Map<string, string>();
  const told = async () => (await deliverMails()).filter(({ to }) => to === email);
  await signIn(email, '192.0.2.3', jar);
  const [first] = await told();
  expect(first?.subject).toBe('Sign-in from a new address');
  expect(first?.text).toContain('Firefox on Linux');
  expect(first?.text).toContain('192.0.2.3');
  await signIn(email, '192.0.2.3', jar);
  await signIn(email, '192.0.2.3');
  expect(await told()).toEqual([]);
  await signIn(email, '203.0.113.5', jar);
  expect((await told()).map(({ subject }) => subject)).toEqual(['Sign-in from a new address']);
});

test('a password is taken to the last space', async () => {
  const { email, session } = await person();
  const newPassword = ' two herons in the reeds ';
  const body = { currentPassword: PASSWORD, newPassword };
  expect((await callApi('POST', '/api/v1/me/password', { session, body })).status).toBe(204);
  expect((await signIn(email, '192.0.2.4', undefined, newPassword.trim())).status).toBe(401);
  expect((await signIn(email, '192.0.2.4', undefined, newPassword)).status).toBe(204);
});

test('sessions tell when they were seen last', async () => {
  const { session } = await person();
  const listed = await (await callApi('GET', '/api/v1/me/sessions', { session })).json();
  expect(Date.now() - Date.parse(listed.items[0].lastSeenAt)).toBeLessThan(120_000);
});

test.each(['expires_at', 'ends_at'])('a session is over once its time is (%s)', async (column) => {
  const { session } = await person();
  expect(await meStatus({ session })).toBe(200);
  await db()('sessions')
    .where({ id_digest: sessionDigest(session) })
    .update({ [column]: new Date(Date.now() - 1000) });
  expect(await meStatus({ session })).toBe(401);
});

test('an access token opens what it is made for and nothing beside', async () => {
  const { session } = await person();
  const make = async (scope: object) => {
    const answer = await callApi('POST', '/api/v1/me/tokens', {
      session,
      body: { name: 'script', days: 7, ...scope },
    });
    return ((await answer.json()) as { token: string }).token;
  };
  const status = async (token: string, method: string, path: string) =>
    (await callApi(method, path, { token, ...(method === 'GET' ? {} : { body: {} }) })).status;
  const home = '/api/v1/networks/home';

  const reading = await make({ access: 'read' });
  expect(await status(reading, 'GET', `${home}/limits`)).toBe(200);
  expect(await status(reading, 'POST', `${home}/limits`)).toBe(403);
  expect(await status(reading, 'PATCH', home)).toBe(403);

  const limits = await make({ access: 'change', families: ['limits'] });
  expect(await status(limits, 'GET', `${home}/limits`)).toBe(200);
  expect(await status(limits, 'POST', `${home}/limits`)).toBe(422);
  expect(await status(limits, 'GET', home)).toBe(200);
  for (const [method, path] of [
    ['GET', `${home}/complaints`],
    ['GET', `${home}/complaints.csv`],
    ['GET', `${home}/search?q=noise`],
    ['PATCH', home],
    ['GET', '/api/v1/me/tokens'],
  ] as const) {
    const refused = await callApi(method, path, { token: limits, ...(method === 'GET' ? {} : { body: {} }) });
    expect(await refused.json(), path).toMatchObject({ status: 403, code: 'outside-scope' });
  }
  const odd = { session, body: { name: 'x', days: 7, families: ['everything'] } };
  expect((await callApi('POST', '/api/v1/me/tokens', odd)).status).toBe(422);
});
