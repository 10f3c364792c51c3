import { beforeEach, expect, test } from 'vitest';
import { inTransaction } from '#db/queries/connection';
import { insertLimit, type NewLimitVersion } from '#db/queries/limits';
import { findStationById } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { receiveBatch } from '#ingest/receive/receive';
import { energyMeanDb } from '#lib/acoustics/energy';
import type { Headroom, LimitHeadroom } from '#lib/contracts/headroom';
import { stationHeadroom } from '#lib/services/headroom/headroom';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const at = (text: string) => Date.parse(`${text}Z`) / 1000;
let networks = 0;
let networkId: number;
let stationId: number;

beforeEach(async () => {
  networks += 1;
  networkId = await makeNetwork(`headroom-${networks}`);
  stationId = await makeStation(networkId, 'HR-1');
});

async function limit(changes: Partial<NewLimitVersion> = {}): Promise<number> {
  const fields: NewLimitVersion = {
    effectiveFromSec: 0,
    name: 'Test',
    metric: 'LAeq',
    averaging: '1h',
    bandFraction: null,
    bandIndex: null,
    thresholdTenths: 600,
    weekdays: 127,
    fromMin: null,
    toMin: null,
    minimumCoverage: null,
    stationIds: null,
    recipients: [],
    reason: '',
    createdBy: null,
    ...changes,
  };
  return inTransaction((transaction) => insertLimit(networkId, fields, transaction));
}

async function measured(from: string, minutes: number, LAeq: number): Promise<void> {
  const intervals = Array.from({ length: minutes }, (_, minute) => ({
    start: new Date((at(from) + minute * 60) * 1000).toISOString(),
    seconds: 60,
    LAeq,
    LAFmax: LAeq + 5,
    levels: [LAeq + 3, LAeq - 3],
  }));
  const envelope = { bands: [80, 100], bandIndices: { indices: [-11, -10] }, intervals };
  await receiveBatch({ id: stationId, bandFraction: 3, acceptsFromSec: null }, envelope, new Date());
}

async function headroomAt(now: string): Promise<LimitHeadroom[]> {
  const station = await findStationById(stationId);
  if (!station) throw new Error('The station is not there.');
  return (await stationHeadroom(station, at(now))).items;
}

async function onlyAt(now: string): Promise<LimitHeadroom> {
  const items = await headroomAt(now);
  expect(items).toHaveLength(1);
  return items[0] as LimitHeadroom;
}

test('half of an hour at 50 dB leaves the other half 62.8 dB under a limit of 60 dB', async () => {
  await limit();
  await measured('2026-03-03T10:00:00', 30, 50);
  for (const isAggregated of [false, true]) {
    if (isAggregated) await aggregateAll(async () => undefined);
    const item = await onlyAt('2026-03-03T10:30:00');
    expect(item).toMatchObject({
      state: 'open',
      from: '2026-03-03T10:00:00Z',
      to: '2026-03-03T11:00:00Z',
      seconds: { valid: 1800, missing: 0, awaited: 0, left: 1800, needed: 900 },
      heading: { from: 'last-15-min' },
      usualHigh: null,
    });
    expect(item.headroom).toBeCloseTo(62.7875, 3);
    expect(item.heading?.level).toBeCloseTo(50, 6);
    expect(item.level).toBeCloseTo(50, 9);
  }
});

test('what is missing is told apart from what is still awaited; the level then ends at the limit', async () => {
  await limit();
  await measured('2026-03-03T10:00:00', 10, 55);
  await measured('2026-03-03T10:20:00', 5, 58);
  const item = await onlyAt('2026-03-03T10:31:00');
  expect(item.seconds).toEqual({ valid: 900, missing: 600, awaited: 360, left: 1740, needed: 1800 });
  expect(energyMeanDb([55, 58, item.headroom ?? NaN], [600, 300, 2100])).toBeCloseTo(60, 6);
});

test('loud enough is certain to pass; the earliest moment is told before, from the usual of past weeks', async () => {
  await limit();
  for (const day of ['02-24', '02-17']) await measured(`2026-${day}T10:00:00`, 60, 66);
  await measured('2026-03-03T10:00:00', 20, 50);
  await measured('2026-03-03T10:20:00', 10, 60);
  const open = await onlyAt('2026-03-03T10:30:00');
  expect(open.usualHigh).toBeCloseTo(66, 6);
  const earliestSec = Date.parse(open.earliestPassing ?? '') / 1000 - at('2026-03-03T10:30:00');
  // (3600·10^6.005 − 1200·10^5 − 600·10^6) / 10^6.6 s, by hand.
  expect(earliestSec).toBe(Math.ceil((3600 * 10 ** 6.005 - 1200 * 10 ** 5 - 600 * 10 ** 6) / energyOf(66)));
  await measured('2026-03-03T10:30:00', 15, 70);
  expect(await onlyAt('2026-03-03T10:45:00')).toMatchObject({
    state: 'certain',
    headroom: null,
    earliestPassing: null,
    seconds: { needed: 0 },
  });
});

test('without data the limit itself is left, until coverage cannot become enough', async () => {
  await limit();
  expect(await onlyAt('2026-03-03T10:20:00')).toMatchObject({
    state: 'no-data',
    level: null,
    headroom: expect.closeTo(60, 9),
    heading: null,
    seconds: { valid: 0, missing: 0, awaited: 1200, left: 2400, needed: 2700 },
  });
  // A minute from 10:15 on tells that the time before it was not measured: just enough is left.
  await measured('2026-03-03T10:15:00', 1, 50);
  expect(await onlyAt('2026-03-03T10:20:00')).toMatchObject({ state: 'open', seconds: { missing: 900 } });
  await measured('2026-03-03T10:17:00', 1, 50);
  expect(await onlyAt('2026-03-03T10:20:00')).toMatchObject({ state: 'not-compared', headroom: null });
});

test('a maximum has no mean to make up for', async () => {
  await limit({ metric: 'LAFmax', thresholdTenths: 700 });
  await measured('2026-03-03T10:00:00', 5, 60);
  expect(await onlyAt('2026-03-03T10:06:00')).toMatchObject({ state: 'open', level: 65, headroom: 70 });
  await measured('2026-03-03T10:05:00', 1, 65.04);
  expect(await onlyAt('2026-03-03T10:06:00')).toMatchObject({ state: 'open' });
  await measured('2026-03-03T10:06:00', 1, 65.05);
  expect(await onlyAt('2026-03-03T10:07:00')).toMatchObject({ state: 'passed', headroom: null });
});

test('a window is open from its first second until before its end', async () => {
  await limit({ fromMin: 600, toMin: 660 });
  expect(await headroomAt('2026-03-03T09:59:59')).toEqual([]);
  expect(await headroomAt('2026-03-03T10:00:00')).toHaveLength(1);
  expect((await onlyAt('2026-03-03T10:59:59')).seconds.left).toBe(1);
  expect(await headroomAt('2026-03-03T11:00:00')).toEqual([]);
});

test.each([
  ['2026-03-28T23:30:00', 7],
  ['2026-10-24T22:30:00', 9],
])('the night of a clock change has the hours that elapse: at %s, %i h', async (now, hours) => {
  await limit({ averaging: 'night' });
  const item = await onlyAt(now);
  const { valid, missing, awaited, left } = item.seconds;
  expect(valid + missing + awaited + left).toBe(hours * 3600);
  expect(item.seconds.needed).toBe(0.75 * hours * 3600);
});

test('the interface tells it to every role of the network, and to nobody else', async () => {
  await limit({ averaging: 'night' });
  await limit({ averaging: 'day' });
  await limit({ averaging: 'evening' });
  const path = `/api/v1/networks/headroom-${networks}/stations/HR-1/headroom`;
  const { session } = await makePerson(networkId, ['regulator']);
  const response = await callApi('GET', path, { session });
  expect(response.status).toBe(200);
  expect(((await response.json()) as Headroom).items).toHaveLength(1);
  const stranger = await makePerson(await makeNetwork(`other-${networks}`), ['operator']);
  expect((await callApi('GET', path, { session: stranger.session })).status).toBe(404);
});

function energyOf(levelDb: number): number {
  return 10 ** (levelDb / 10);
}
