import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { deliverMails, givePassword, meStatus, signInStatus, tokenIn } from './support';

useFreshSchema();

const OLD = 'a heron in the reeds';
const NEW = 'two herons in the reeds';
let networkId: number;
let address = 0;

beforeAll(async () => {
  networkId = await makeNetwork('home');
});

async function person() {
  const { userId, session } = await makePerson(networkId, ['operator']);
  return { userId, session, email: await givePassword(userId, OLD) };
}

/** From an address of its own, so that the pace of asking does not matter. */
const ask = (email: string) =>
  callApi('POST', '/api/v1/password-links', { body: { email }, clientAddress: `192.0.2.${(address += 1)}` });

const use = (token: string, password = NEW) =>
  callApi('POST', '/api/v1/password-links/use', { body: { token, password } });

/** What a call asks the database, without the values. */
async function statementsOf(call: () => Promise<unknown>): Promise<string[]> {
  const statements: string[] = [];
  const note = ({ sql }: { sql: string }) => statements.push(sql);
  db().on('query', note);
  try {
    await call();
  } finally {
    db().removeListener('query', note);
  }
  return statements;
}

test('asking is the same for an address that is nobody’s: answer, headers, and what the database does', async () => {
  const { email } = await person();
  const answers: unknown[] = [];
  const asked: string[][] = [];
  for (const one of [email, 'nobody@people.example', email.toUpperCase()]) {
    asked.push(
      await statementsOf(async () => {
        const answer = await ask(one);
        answers.push([answer.status, [...answer.headers], await answer.text()]);
      }),
    );
  }
  expect(answers[0]).toMatchObject([202, expect.anything(), expect.any(String)]);
  expect(answers[1]).toEqual(answers[0]);
  expect(answers[2]).toEqual(answers[0]);
  expect(asked[0]?.length).toBeGreaterThan(0);
  expect(asked[1]).toEqual(asked[0]);

  const delivered = await deliverMails();
  expect(delivered.map(({ to }) => to)).toEqual([email, email]);
  expect(await db()('outbox').where({ recipient: 'nobody@people.example' })).toEqual([]);
});

test('the link changes the password once, ends sessions and other links, and its owner is told', async () => {
  const { email, session } = await person();
  await ask(email);
  await ask(email);
  const [first, second] = (await deliverMails()).map(tokenIn);
  expect((await use(first ?? '', 'password1234')).status).toBe(422);
  expect((await use(first ?? '')).status).toBe(204);
  expect(await meStatus({ session })).toBe(401);
  expect(await signInStatus(email, OLD)).toBe(401);
  expect(await signInStatus(email, NEW)).toBe(204);
  expect((await use(first ?? '', OLD)).status).toBe(410);
  expect((await use(second ?? '', OLD)).status).toBe(410);
  const told = (await deliverMails()).filter(({ to }) => to === email).map(({ subject }) => subject);
  expect(told).toContain('Your password was changed');
});

test('used twice at the same moment it holds once', async () => {
  const { email } = await person();
  await ask(email);
  const token = tokenIn((await deliverMails())[0]);
  const answers = await Promise.all([use(token, NEW), use(token, 'three herons in the reeds')]);
  expect(answers.map(({ status }) => status).sort()).toEqual([204, 410]);
});

test('an address that only looks like somebody’s leads to the mailbox as it is stored', async () => {
  const { userId } = await person();
  await db()('users').where({ id: userId }).update({ email: 'jose@people.example' });
  await deliverMails();
  await ask('jose@people.example');
  await db()('outbox').where({ state: 'waiting' }).update({ recipient: 'josé@people.example' });
  expect((await deliverMails()).map(({ to }) => to)).toEqual(['jose@people.example']);
});

test('disabled people get none, a mailbox gets five an hour, an address may not ask without end', async () => {
  const gone = await person();
  await db()('users').where({ id: gone.userId }).update({ disabled_at: new Date() });
  await ask(gone.email);
  expect(await deliverMails()).toEqual([]);

  const { email } = await person();
  for (let n = 0; n < 7; n += 1) await ask(email);
  expect(await deliverMails()).toHaveLength(5);

  const from = { clientAddress: '198.51.100.9', body: { email: 'nobody@people.example' } };
  const statuses: number[] = [];
  for (let n = 0; n < 11; n += 1)
    statuses.push((await callApi('POST', '/api/v1/password-links', from)).status);
  expect(statuses).toEqual([...Array<number>(10).fill(202), 429]);
});

test('a link that has run out opens nothing', async () => {
  const { email } = await person();
  await ask(email);
  const token = tokenIn((await deliverMails())[0]);
  await db()('account_tokens').update({ expires_at: new Date(Date.now() - 1000) });
  expect((await use(token)).status).toBe(410);
});
