import { beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { findLimit, insertLimit, insertVersion, type NewLimitVersion } from '#db/queries/limits';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { judgeDueWindows, type TellingChange } from '#ingest/detect/judge';
import { pendWindowsFor } from '#ingest/detect/pendWindows';
import { tellExceedances } from '#ingest/notify/tellExceedances';
import { receiveBatch } from '#ingest/receive/receive';
import { addExclusion } from '#lib/services/exclusions/add';
import { withdraw } from '#lib/services/exclusions/withdraw';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const at = (text: string) => Date.parse(`2026-03-03T${text}Z`) / 1000;
/** Tuesday 3 March 2026, 12:00 in London (GMT). */
const NOW = new Date('2026-03-03T12:00:00Z');
let networks = 0;
let networkId: number;
let stationId: number;
let told: TellingChange['kind'][];

beforeEach(async () => {
  networks += 1;
  networkId = await makeNetwork(`judge-${networks}`);
  stationId = await makeStation(networkId, 'JD-1');
  told = [];
});

async function limit(changes: Partial<NewLimitVersion> = {}): Promise<number> {
  const fields: NewLimitVersion = {
    effectiveFromSec: 0,
    name: 'Test',
    metric: 'LAeq',
    averaging: '15min',
    bandFraction: null,
    bandIndex: null,
    thresholdTenths: 600,
    weekdays: 127,
    fromMin: null,
    toMin: null,
    minimumCoverage: null,
    stationIds: null,
    recipients: ['operator@judge.example'],
    reason: '',
    createdBy: null,
    ...changes,
  };
  return inTransaction((transaction) => insertLimit(networkId, fields, transaction));
}

/** Minutes from a clock time, all at one level unless told otherwise. */
async function measured(
  from: string,
  minutes: number,
  LAeq: number,
  changes: Record<string, unknown> = {},
): Promise<void> {
  const intervals = Array.from({ length: minutes }, (_, minute) => ({
    start: new Date((at(from) + minute * 60) * 1000).toISOString(),
    seconds: 60,
    LAeq,
    LAFmax: LAeq + 5,
    levels: [LAeq + 3, LAeq - 3, LAeq - 9],
    ...changes,
  }));
  const envelope = { bands: [80, 100, 125], bandIndices: { indices: [-11, -10, -9] }, intervals };
  await receiveBatch({ id: stationId, bandFraction: 3, acceptsFromSec: null }, envelope, NOW);
}

async function judge(now = NOW): Promise<void> {
  await aggregateAll(pendWindowsFor);
  const tell = async (changes: TellingChange[], ...rest: [Date, Parameters<typeof tellExceedances>[2]]) => {
    told.push(...changes.map(({ kind }) => kind));
    await tellExceedances(changes, ...rest);
  };
  while ((await judgeDueWindows(now, tell)) > 0);
}

const exceedances = () => db()('exceedances').where({ network_id: networkId }).orderBy('starts_at');
const mails = () => db()('outbox').where({ network_id: networkId }).orderBy('id');

test('a window above the limit is an exceedance with its level, coverage and one e-mail', async () => {
  await limit();
  await measured('10:00:00', 15, 60.1);
  await measured('10:15:00', 15, 60.04);
  await judge();
  expect(await exceedances()).toMatchObject([
    {
      starts_at: at('10:00:00'),
      ends_at: at('10:15:00'),
      threshold_tenths: 600,
      coverage: 1,
      state: 'standing',
    },
  ]);
  const sent = await mails();
  expect(sent).toHaveLength(1);
  expect(sent[0]).toMatchObject({ recipient: 'operator@judge.example', state: 'waiting' });
  expect(sent[0].text_body).toContain('60.1 dB');
  expect(sent[0].text_body).toContain('Europe/London');
});

test('exactly the limit is not above it; the level is rounded half up to tenths first', async () => {
  await limit();
  await measured('10:00:00', 15, 60.04);
  await measured('10:15:00', 15, 60.05);
  await judge();
  expect((await exceedances()).map(({ starts_at }) => starts_at)).toEqual([at('10:15:00')]);
});

test('a window is not judged before it has closed and settled', async () => {
  await limit();
  await measured('11:45:00', 15, 70);
  await judge(new Date((at('12:00:00') + 59) * 1000));
  expect(await exceedances()).toEqual([]);
  await judge(new Date((at('12:00:00') + 60) * 1000));
  expect(await exceedances()).toHaveLength(1);
});

test('a mean level without enough coverage is not compared; a measured maximum is', async () => {
  await limit();
  await limit({ metric: 'LAFmax', averaging: '1h', thresholdTenths: 700 });
  await measured('10:00:00', 11, 75);
  await judge();
  expect(await exceedances()).toMatchObject([
    { level_db: 80, threshold_tenths: 700, ends_at: at('11:00:00') },
  ]);
});

test('later data lift an exceedance, change it, or make it stand again, and each is told once', async () => {
  await limit({ averaging: '1h' });
  await measured('10:00:00', 45, 60.2);
  await judge();
  await judge();
  expect(told).toEqual(['found']);
  await measured('10:45:00', 5, 66);
  await judge();
  expect(told).toEqual(['found', 'changed']);
  const exclusion = await addExclusion({
    networkId,
    stationCode: 'JD-1',
    fromSec: at('10:30:00'),
    toSec: at('11:00:00'),
    reason: 'Mower',
    userId: (await makePerson(networkId, ['operator'])).userId,
  });
  await judge();
  expect(told).toEqual(['found', 'changed', 'lifted']);
  expect(await exceedances()).toMatchObject([{ state: 'lifted', coverage: 0.5 }]);
  const { userId } = await makePerson(networkId, ['operator']);
  await withdraw({ networkId, id: exclusion?.id ?? 0, reason: 'It was not the mower', userId });
  await judge();
  expect(told).toEqual(['found', 'changed', 'lifted', 'again']);
  expect(await exceedances()).toMatchObject([{ state: 'standing' }]);
  expect(new Set((await mails()).map(({ message_id }) => message_id)).size).toBe(4);
});

test('windows of long ago make exceedances but no e-mail', async () => {
  await limit();
  await measured('10:00:00', 15, 70);
  await judge(new Date(NOW.getTime() + 3 * 86_400_000));
  expect(await exceedances()).toHaveLength(1);
  expect(await mails()).toEqual([]);
});

test('weekdays and clock times decide which windows count, across midnight', async () => {
  await limit({ fromMin: 23 * 60, toMin: 60, weekdays: 1 << 1 });
  await measured('00:30:00', 60, 70);
  await measured('10:00:00', 15, 70);
  await judge();
  expect((await exceedances()).map(({ starts_at }) => starts_at)).toEqual([at('00:30:00'), at('00:45:00')]);
});

test('a band limit looks at that band; an octave of a one-third-octave station is the sum of its thirds', async () => {
  await limit({ metric: 'bandLeq', bandFraction: 3, bandIndex: -10, thresholdTenths: 569 });
  await limit({ metric: 'bandLeq', bandFraction: 1, bandIndex: -9, thresholdTenths: 500 });
  await measured('10:00:00', 15, 60);
  await judge();
  const found = await exceedances();
  expect(found).toHaveLength(1);
  expect(found[0].level_db).toBeCloseTo(57, 6);
});

test('a limit goes by the version in force when the window begins; past exceedances keep theirs', async () => {
  const id = await limit({ thresholdTenths: 600 });
  const [first] = await findLimit(networkId, id);
  if (!first) throw new Error('The limit is not there.');
  await inTransaction((transaction) =>
    insertVersion(id, 2, { ...first, effectiveFromSec: at('10:15:00'), thresholdTenths: 650 }, transaction),
  );
  await measured('10:00:00', 30, 62);
  await judge();
  expect(await exceedances()).toMatchObject([{ starts_at: at('10:00:00'), threshold_tenths: 600 }]);
});

test('a withdrawn limit judges no window that begins later', async () => {
  const id = await limit();
  await db()('limits')
    .where({ id })
    .update({ withdrawn_at: new Date(at('10:10:00') * 1000) });
  await measured('10:00:00', 30, 70);
  await judge();
  expect((await exceedances()).map(({ starts_at }) => starts_at)).toEqual([at('10:00:00')]);
});

test('two judges at once find each exceedance and write each e-mail once', async () => {
  await limit();
  await measured('06:00:00', 240, 70);
  await aggregateAll(pendWindowsFor);
  await Promise.all([1, 2, 3].map(() => judgeDueWindows(NOW, tellExceedances)));
  expect(await exceedances()).toHaveLength(16);
  const lines = (await mails()).flatMap(({ text_body }) => text_body.match(/exceedances\/\d+/g) ?? []);
  expect(lines).toHaveLength(16);
  expect(new Set(lines).size).toBe(16);
  expect(await db()('pending_windows').where({ station_id: stationId })).toEqual([]);
});
