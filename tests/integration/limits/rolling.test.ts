import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertLimit, insertVersion, type NewLimitVersion } from '#db/queries/limits';
import type { TellingChange } from '#ingest/detect/judge';
import { tellExceedances } from '#ingest/notify/tellExceedances';
import { pendLimit } from '#lib/services/limits/pendLimit';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';
import { judged, minutesAt, send } from './support';

useFreshSchema();

const at = (text: string) => Date.parse(`2026-03-03T${text}Z`) / 1000;
const clock = (sec: number) => new Date(sec * 1000).toISOString().slice(11, 16);
const RULE: NewLimitVersion = {
  effectiveFromSec: 0,
  name: 'Rolling half-hour',
  metric: 'LAeq',
  averaging: 'length',
  windowMin: 30,
  stepMin: 5,
  bandFraction: null,
  bandIndex: null,
  thresholdTenths: 600,
  weekdays: 127,
  fromMin: null,
  toMin: null,
  minimumCoverage: null,
  stationIds: null,
  recipients: ['operator@rolling.example'],
  reason: '',
  createdBy: null,
};

let networks = 0;
let networkId: number;
let stationId: number;
let limitId: number;
let told: TellingChange['kind'][];

beforeEach(async () => {
  networks += 1;
  networkId = await makeNetwork(`rolling-${networks}`);
  stationId = await makeStation(networkId, 'RO-1');
  limitId = await inTransaction((transaction) => insertLimit(networkId, RULE, transaction));
  told = [];
});

afterEach(() => {
  vi.useRealTimers();
});

async function measured(from: string, minutes: number, LAeq: number): Promise<void> {
  vi.useRealTimers();
  await send(stationId, at(from), minutesAt(LAeq, minutes));
}

async function judgeAt(clockTime: string): Promise<void> {
  const now = new Date((at(clockTime) + 60) * 1000);
  vi.useFakeTimers({ toFake: ['Date'], now });
  told.push(...(await judged(tellExceedances, now)).map(({ kind }) => kind));
}

async function found() {
  const rows = await db()('exceedances').where({ limit_id: limitId }).orderBy('starts_at');
  return rows.map((row) => [
    `${clock(row.starts_at)}–${clock(row.ends_at)}`,
    row.loudest_starts_at === null ? null : `${clock(row.loudest_starts_at)}–${clock(row.loudest_ends_at)}`,
    Math.round(row.level_db * 10) / 10,
    row.state,
  ]);
}

test('rolling windows that follow one another are one exceedance, told when it begins and once when it is over', async () => {
  await measured('10:00:00', 60, 50);
  await measured('11:00:00', 15, 66);
  await judgeAt('11:15:00');
  // 10 min at 66 dB of 30 are 61.3 dB, 15 min 63.1 dB.
  expect(await found()).toEqual([['10:40–11:15', '10:45–11:15', 63.1, 'standing']]);
  expect(told).toEqual(['found']);
  await measured('11:15:00', 15, 66);
  await judgeAt('11:30:00');
  expect(await found()).toEqual([['10:40–11:30', '11:00–11:30', 66, 'standing']]);
  expect(told).toEqual(['found']);
  await measured('11:30:00', 60, 50);
  await judgeAt('12:30:00');
  expect(await found()).toEqual([['10:40–11:50', '11:00–11:30', 66, 'standing']]);
  expect(told).toEqual(['found', 'changed']);
  const mails = await db()('outbox').where({ network_id: networkId }).orderBy('id');
  expect(mails[0].text_body).toContain('LAeq,30 min, rolling by 5 min above 60.0 dB');
  expect(mails[0].text_body).toContain('10:45 to 11:15');
  expect(mails[0].text_body).toContain('later windows may go on');
});

test('late data that come before it make the same exceedance longer; data between join two', async () => {
  await measured('10:00:00', 30, 66);
  await measured('12:00:00', 30, 66);
  await judgeAt('13:00:00');
  // Windows with three quarters of their time covered.
  expect((await found()).map(([window]) => window)).toEqual(['09:55–10:35', '11:55–12:35']);
  const [first] = await db()('exceedances').where({ limit_id: limitId }).orderBy('starts_at');
  await measured('09:30:00', 30, 66);
  await judgeAt('13:00:00');
  const [longer] = await db()('exceedances').where({ limit_id: limitId }).orderBy('starts_at');
  expect([longer.id, clock(longer.starts_at)]).toEqual([first.id, '09:25']);
  await measured('10:30:00', 90, 66);
  await judgeAt('13:00:00');
  expect((await found()).map(([window, , , state]) => [window, state])).toEqual([
    ['09:25–12:35', 'standing'],
    ['11:55–12:35', 'lifted'],
  ]);
});

test('a stricter version cuts it, a fixed one takes its place, and nothing is judged twice', async () => {
  await measured('10:00:00', 60, 66);
  await judgeAt('12:00:00');
  const revise = async (changes: Partial<NewLimitVersion>, version: number) => {
    await inTransaction(async (transaction) => {
      await insertVersion(limitId, version, { ...RULE, ...changes }, transaction);
      await pendLimit(networkId, limitId, at('00:00:00'), transaction);
    });
    await judgeAt('12:00:00');
  };
  await revise({ thresholdTenths: 700 }, 2);
  expect((await found()).map(([, , , state]) => state)).toEqual(['lifted']);
  await revise({ averaging: '1h', windowMin: null, stepMin: null }, 3);
  expect((await found()).filter(([, , , state]) => state === 'standing')).toEqual([
    ['10:00–11:00', null, 66, 'standing'],
  ]);
});
