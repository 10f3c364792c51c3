import { spawnSync } from 'node:child_process';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { migrateUp } from '#db/migrateUp';
import { aggregate } from '#ingest/jobs/aggregate';
import { callApi } from '../integration/support/callApi';
import { makeNetwork, makeStation } from '../integration/support/people';
import { OWN_DATABASE, OwnServer } from './support/ownServer';

/** Faults of the database while posts come: what was acknowledged is there, what was not is taken afterwards. */
const SMALL_MIB = 48;
const POST_INTERVALS = 2000;
let server: OwnServer;
let hasSmallDisk: boolean;
let token: string;
let stationId: number;
let nextMinute = 0;
const acknowledged: number[] = [];

beforeAll(async () => {
  server = await OwnServer.start();
  hasSmallDisk = mount(`size=${SMALL_MIB}m`);
  await migrateUp();
  stationId = await makeStation(await makeNetwork('quay'), 'QY-1');
  token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
});

afterAll(async () => {
  await closeDb();
  await server.stop(() => {
    if (hasSmallDisk) spawnSync('umount', [server.dataDirectory]);
  });
});

/** Puts the database's own directory on a small disk in memory, or makes that one larger. */
function mount(options: string): boolean {
  const given = ['-t', 'tmpfs', '-o', `${options},mode=777`, 'tmpfs', server.dataDirectory];
  return spawnSync('mount', given).status === 0;
}

interface Batch {
  startsSec: number[];
  body: unknown;
}

function nextBatch(count: number): Batch {
  const startsSec = Array.from(
    { length: count },
    (_, at) => Date.UTC(2025, 0, 1) / 1000 + (nextMinute + at) * 60,
  );
  nextMinute += count;
  const levels = Array.from({ length: 33 }, (_, band) => 30 + (band % 7));
  const bands = [
    12.5, 16, 20, 25, 31.5, 40, 50, 63, 80, 100, 125, 160, 200, 250, 315, 400, 500, 630, 800, 1000, 1250,
    1600, 2000, 2500, 3150, 4000, 5000, 6300, 8000, 10000, 12500, 16000, 20000,
  ];
  const intervals = startsSec.map((startSec) => ({
    start: new Date(startSec * 1000).toISOString(),
    seconds: 60,
    LAeq: 52.3,
    levels,
  }));
  return { startsSec, body: { bands, intervals } };
}

/** Posts once. @returns whether it was acknowledged; anything but that and "come again" fails the test. */
async function post({ startsSec, body }: Batch): Promise<boolean> {
  const response = await callApi('POST', '/api/v1/intervals', { token, body });
  if (response.status === 503) {
    expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0);
    return false;
  }
  expect(response.status).toBe(200);
  const answer = (await response.json()) as { accepted: number; known: number };
  expect(answer.accepted + answer.known).toBe(startsSec.length);
  acknowledged.push(...startsSec);
  return true;
}

async function postUntilTaken(batch: Batch): Promise<number> {
  for (let refusals = 0; ; refusals += 1) {
    if (await post(batch)) return refusals;
    await sleep(200);
  }
}

async function expectNothingLost(): Promise<void> {
  const stored = new Set<number>(
    await db()('interval_levels').where({ station_id: stationId }).pluck('starts_at'),
  );
  expect(acknowledged.filter((startSec) => !stored.has(startSec))).toEqual([]);
  expect(stored.size).toBe(acknowledged.length);
}

test('a database that is restarted: posts wait, nothing acknowledged is lost', async () => {
  let isUp = false;
  const restarted = server.restart().then(() => (isUp = true));
  let posts = 0;
  for (; !isUp || posts < 2; posts += 1) await postUntilTaken(nextBatch(5));
  await restarted;
  await expectNothingLost();
});

test('a disk that fills up: 503 rather than a loss, and work goes on when there is room', async (context) => {
  if (!hasSmallDisk) context.skip('a file system in memory cannot be mounted by this account');
  let isFull = false;
  let refused: Batch | undefined;
  for (let round = 0; round < 200 && !isFull; round += 1) {
    const batch = nextBatch(POST_INTERVALS);
    if (await post(batch)) continue;
    isFull = true;
    refused = batch;
  }
  expect(isFull).toBe(true);
  await expectNothingLost();
  mount(`remount,size=${SMALL_MIB * 4}m`);
  if (refused) await postUntilTaken(refused);
  await expectNothingLost();
});

test('a lock that is held: posts of other stations go on, and the one that waits is taken once it is free', async () => {
  const networkId = (await db()('networks').first('id')).id as number;
  const other = await makeStation(networkId, `QY-${nextMinute}`);
  const otherToken = await inTransaction((transaction) => insertStationToken(other, null, transaction));
  const holder = await db().transaction();
  await holder('station_locks').where({ station_id: stationId }).forUpdate().first();
  let isTaken = false;
  const waiting = postUntilTaken(nextBatch(1)).then(() => (isTaken = true));
  for (let round = 0; round < 3; round += 1) {
    const { body } = nextBatch(1);
    const response = await callApi('POST', '/api/v1/intervals', { token: otherToken, body });
    expect(response.status).toBe(200);
  }
  expect(isTaken).toBe(false);
  await holder.rollback();
  await waiting;
  await expectNothingLost();
});

test('deadlocks: aggregation and posts for the same station end with everything computed', async () => {
  const posts = Promise.all(Array.from({ length: 6 }, () => postUntilTaken(nextBatch(30))));
  const rounds = Promise.all(
    Array.from({ length: 3 }, async () => {
      for (let round = 0; round < 2; round += 1) await aggregate().catch(() => 0);
    }),
  );
  await Promise.all([posts, rounds]);
  await expectNothingLost();
  for (let round = 0; round < 40 && (await aggregate()) > 0; round += 1);
  const [[marks]] = (await db().raw(`SELECT COUNT(*) AS count FROM ${OWN_DATABASE}.dirty_marks`)) as [
    { count: number }[],
  ];
  expect(Number(marks?.count)).toBe(0);
});
