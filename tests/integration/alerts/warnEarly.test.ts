import { beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { DEFAULT_PREFERENCES, setAlertPreferences } from '#db/queries/alertPreferences';
import { warnEarly } from '#ingest/notify/warnEarly';
import { receiveBatch } from '#ingest/receive/receive';
import { makeLimit } from '../exceedances/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { emailOf, outbox } from './support';

useFreshSchema();

const at = (time: string) => new Date(`2026-03-03T${time}Z`);
let networks = 0;
let networkId: number;
let stationId: number;
let wishing: string;

beforeEach(async () => {
  networks += 1;
  await db()('alert_preferences').delete();
  await db()('outbox').delete();
  networkId = await makeNetwork(`warn-${networks}`);
  stationId = await makeStation(networkId, 'WE-1');
  await makeLimit(networkId, 'Quay');
  wishing = (await makePerson(networkId, ['operator'])).userId;
  await makePerson(networkId, ['operator']);
  await prefer(wishing);
});

const prefer = (userId: string, changes = {}) =>
  setAlertPreferences({ networkId, userId }, { ...DEFAULT_PREFERENCES, warnsEarly: true, ...changes }, db());

async function measured(from: string, minutes: number, LAeq: number): Promise<void> {
  const intervals = Array.from({ length: minutes }, (_, minute) => ({
    start: new Date(at(from).getTime() + minute * 60_000).toISOString(),
    seconds: 60,
    LAeq,
    levels: [LAeq + 3, LAeq - 3],
  }));
  const envelope = { bands: [80, 100], bandIndices: { indices: [-11, -10] }, intervals };
  await receiveBatch({ id: stationId, bandFraction: 3, acceptsFromSec: null }, envelope, at('12:00:00'));
}

test('one message a window and person who wishes it, with what the rest may be and where it is heading', async () => {
  await measured('10:00:00', 30, 56);
  expect(await warnEarly(at('10:10:00'))).toBe(0);
  const all = await Promise.all([warnEarly(at('10:30:00')), warnEarly(at('10:30:00'))]);
  expect(all.reduce((sum, count) => sum + count, 0)).toBe(1);
  expect(await warnEarly(at('10:40:00'))).toBe(0);
  const [mail] = await outbox();
  expect(mail).toMatchObject({ recipient: await emailOf(wishing), kind: 'early-warning' });
  expect(mail.subject).toBe('WE-1 Station WE-1: heading above the limit by 11:00');
  expect(mail.text_body).toContain('The remaining 30 min of the window may be at most 53.6 dB on average.');
  expect(mail.text_body).toContain('It is heading for 56.0 dB if it goes on like the last 15 minutes.');
});

test('nothing in quiet hours, of other stations, or when it is not heading above', async () => {
  await prefer(wishing, { quietFromMin: 9 * 60, quietToMin: 10 * 60 + 31 });
  await measured('10:00:00', 30, 56);
  expect(await warnEarly(at('10:30:00'))).toBe(0);
  await prefer(wishing, { stationIds: [stationId + 999] });
  expect(await warnEarly(at('10:31:00'))).toBe(0);
  await prefer(wishing);
  await measured('11:00:00', 30, 55);
  expect(await warnEarly(at('11:30:00'))).toBe(0);
  expect(await warnEarly(at('10:31:00'))).toBe(1);
});

test('certain to pass is said so', async () => {
  await measured('10:00:00', 30, 60);
  expect(await warnEarly(at('10:30:00'))).toBe(1);
  const [mail] = await outbox();
  expect(mail.subject).toContain('will pass the limit by 11:00');
  expect(mail.text_body).toContain('even if the remaining 30 min are silent');
});
