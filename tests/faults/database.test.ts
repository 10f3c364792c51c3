import { spawnSync } from 'node:child_process';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { migrateUp } from '#db/migrateUp';
import { makeNetwork, makeStation } from '../integration/support/people';
import { testLocks } from './support/lockTests';
import { OwnServer } from './support/ownServer';
import { PostingStation, type Batch } from './support/postingStation';

/** Faults of the database while posts come: what was acknowledged is there, what was not is taken afterwards. */
const SMALL_MIB = 48;
const POST_INTERVALS = 2000;
let server: OwnServer;
let hasSmallDisk: boolean;
let posting: PostingStation;

beforeAll(async () => {
  server = await OwnServer.start();
  hasSmallDisk = mount(`size=${SMALL_MIB}m`);
  await migrateUp();
  const stationId = await makeStation(await makeNetwork('quay'), 'QY-1');
  posting = new PostingStation(
    stationId,
    await inTransaction((transaction) => insertStationToken(stationId, null, transaction)),
  );
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

test('a database that is restarted: posts wait, nothing acknowledged is lost', async () => {
  let isUp = false;
  const restarted = server.restart().then(() => (isUp = true));
  let posts = 0;
  for (; !isUp || posts < 2; posts += 1) await posting.postUntilTaken(posting.nextBatch(5));
  await restarted;
  await posting.expectNothingLost();
});

test('a disk that fills up: 503 rather than a loss, and work goes on when there is room', async (context) => {
  if (!hasSmallDisk) context.skip('a file system in memory cannot be mounted by this account');
  let isFull = false;
  let refused: Batch | undefined;
  for (let round = 0; round < 200 && !isFull; round += 1) {
    const batch = posting.nextBatch(POST_INTERVALS);
    if (await posting.post(batch)) continue;
    isFull = true;
    refused = batch;
  }
  expect(isFull).toBe(true);
  await posting.expectNothingLost();
  mount(`remount,size=${SMALL_MIB * 4}m`);
  if (refused) await posting.postUntilTaken(refused);
  await posting.expectNothingLost();
});

testLocks(() => posting);
