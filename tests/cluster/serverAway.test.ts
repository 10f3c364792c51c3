import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertLimit } from '#db/queries/limits';
import { killProcess } from '#ops/cluster/processes';
import { startDatabases } from '#ops/cluster/programs';
import type { PostingStation } from '../faults/support/postingStation';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makeNetwork } from '../integration/support/people';
import { RECEIVER, startBittern, stopBittern } from './support/bittern';
import { testCluster } from './support/cluster';
import { computedSec, stationOn } from './support/stationOn';

/** A data server that stays away: stations of the others are posted for, computed and judged all the same. */
const AWAY = 'data2';
const POST_INTERVALS = 30;
const WITHIN = { timeout: 60_000, interval: 500 };
const layout = testCluster();
useFreshSchema();
let ofAway: PostingStation;
let ofOther: PostingStation;

beforeAll(async () => {
  const networkId = await makeNetwork('quay');
  ofAway = await stationOn(networkId, AWAY);
  ofOther = await stationOn(networkId, 'data1');
  // What these stations post is louder.
  const limit = {
    effectiveFromSec: 0,
    name: 'Quay',
    metric: 'LAeq',
    averaging: '15min',
    thresholdTenths: 500,
  } as const;
  const always = { bandFraction: null, bandIndex: null, weekdays: 127, fromMin: null, toMin: null } as const;
  const more = { minimumCoverage: null, stationIds: null, recipients: [], reason: '', createdBy: null };
  await inTransaction((transaction) => insertLimit(networkId, { ...limit, ...always, ...more }, transaction));
  await startBittern(RECEIVER);
}, 120_000);

afterAll(async () => {
  await startDatabases(layout);
  await stopBittern();
  await closeDb();
}, 120_000);

/** Expects that all that a station was told to be stored is computed and judged. */
async function expectDone(station: PostingStation, posts: number): Promise<void> {
  await expect.poll(() => computedSec(station), WITHIN).toBe(posts * POST_INTERVALS * 60);
  await expect
    .poll(async () => {
      const windows = await db()('exceedances').where({ station_id: station.stationId }).select('ends_at');
      return Math.max(...windows.map(({ ends_at }) => Number(ends_at)));
    }, WITHIN)
    .toBe(Date.UTC(2025, 0, 1) / 1000 + posts * POST_INTERVALS * 60);
}

test('while a data server is away the stations of another are computed and judged, and its own afterwards', async () => {
  for (const station of [ofAway, ofOther]) await station.postUntilTaken(station.nextBatch(POST_INTERVALS));
  for (const station of [ofAway, ofOther]) await expectDone(station, 1);

  expect(killProcess(layout, AWAY)).toBe(true);
  const refused = ofAway.nextBatch(POST_INTERVALS);
  expect(await ofAway.post(refused)).toBe(false);
  await ofOther.postUntilTaken(ofOther.nextBatch(POST_INTERVALS));
  await expectDone(ofOther, 2);

  await startDatabases(layout);
  await ofAway.postUntilTaken(refused);
  await expectDone(ofAway, 2);
  for (const station of [ofAway, ofOther]) await station.expectNothingLost();
}, 240_000);
