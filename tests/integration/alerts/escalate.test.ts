import { beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { escalate } from '#ingest/notify/escalate';
import { changeEscalation, escalationOf } from '#lib/services/alerts/escalation';
import { acknowledge } from '#lib/services/exceedances/acknowledge';
import { makeLimit } from '../exceedances/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { emailOf, findAndTell, outbox, setRecipients } from './support';

useFreshSchema();

const MINUTE_MS = 60_000;
let networks = 0;
let networkId: number;
let stationId: number;
let limit: Awaited<ReturnType<typeof makeLimit>>;
let first: string;
let second: string;
let regulator: string;
/** After the steps were set. */
let start: number;

beforeEach(async () => {
  networks += 1;
  await db()('escalation_steps').delete();
  await db()('outbox').delete();
  networkId = await makeNetwork(`escalate-${networks}`);
  stationId = await makeStation(networkId, 'ES-1');
  limit = await makeLimit(networkId, 'Quay');
  await setRecipients(limit.versionId, []);
  first = (await makePerson(networkId, ['operator'])).userId;
  second = (await makePerson(networkId, ['operator'])).userId;
  regulator = (await makePerson(networkId, ['regulator'])).userId;
  const steps = [
    { afterMinutes: 15, people: [first] },
    { afterMinutes: 60, people: [first, second] },
  ];
  expect((await changeEscalation({ networkId, userId: first }, steps)).kind).toBe('done');
  start = Date.now() + MINUTE_MS;
});

const found = (minute = 0) =>
  findAndTell({ networkId, stationId, limit, now: new Date(start + minute * MINUTE_MS), levelDb: 58 });
const passMinute = (minute: number) => escalate(new Date(start + minute * MINUTE_MS));
const told = async () => (await outbox()).map(({ recipient }) => recipient);

test('each step is told once, exactly when its minutes are over, by two workers too', async () => {
  await found();
  await passMinute(14.99);
  expect(await told()).toEqual([]);
  await Promise.all([passMinute(15), passMinute(15), passMinute(15.1)]);
  expect(await told()).toEqual([await emailOf(first)]);
  await passMinute(59.9);
  expect(await told()).toHaveLength(1);
  await passMinute(60);
  await passMinute(61);
  expect((await told()).sort()).toEqual(
    [await emailOf(first), await emailOf(first), await emailOf(second)].sort(),
  );
  const [mail] = await outbox();
  expect(mail.subject).toBe('Not acknowledged: ES-1 Station ES-1: above the limit by 3.0 dB');
  expect(mail.text_body).toContain('/acknowledge/');
});

test('several at once are one message; what is acknowledged or lifted is not escalated', async () => {
  const ids = [await found(0), await found(1), await found(2), await found(3)];
  const given = { note: 'Seen.', cause: null, causeDetail: null, version: null };
  await acknowledge({ networkId, id: ids[0] ?? 0, userId: second, given });
  await db()('exceedances').where({ id: ids[1] }).update({ state: 'lifted' });
  await passMinute(20);
  const mails = await outbox();
  expect(mails).toHaveLength(1);
  expect(mails[0].subject).toContain('2 exceedances');
});

test('what was found before the steps were set, or whose people have left, wakes nobody', async () => {
  await findAndTell({ networkId, stationId, limit, now: new Date(Date.now() - 10 * MINUTE_MS), levelDb: 58 });
  await passMinute(20);
  expect(await told()).toEqual([]);
  await found();
  await db()('users').where({ id: first }).update({ disabled_at: new Date() });
  await passMinute(15);
  expect(await told()).toEqual([]);
  await passMinute(60);
  expect(await told()).toEqual([await emailOf(second)]);
});

test('only people who may acknowledge can be named, each step later than the one before', async () => {
  const who = { networkId, userId: first };
  const wrong = await changeEscalation(who, [{ afterMinutes: 15, people: [regulator] }]);
  expect(wrong).toMatchObject({ kind: 'invalid', problems: [{ field: 'people1' }] });
  const order = [
    { afterMinutes: 15, people: [first] },
    { afterMinutes: 15, people: [second] },
  ];
  expect(await changeEscalation(who, order)).toMatchObject({ problems: [{ field: 'after2' }] });
  expect((await escalationOf(networkId)).steps).toHaveLength(2);
  await changeEscalation(who, []);
  expect((await escalationOf(networkId)).steps).toEqual([]);
});
