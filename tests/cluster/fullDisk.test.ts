import { execFileSync, spawnSync } from 'node:child_process';
import { readdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { config } from '#lib/config/index';
import { databaseDirectory } from '#ops/cluster/databases';
import { pidOf, stopProcess } from '#ops/cluster/processes';
import { startDatabases } from '#ops/cluster/programs';
import type { Batch, PostingStation } from '../faults/support/postingStation';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makeNetwork } from '../integration/support/people';
import { RECEIVER, startBittern, stopBittern } from './support/bittern';
import { testCluster } from './support/cluster';
import { computedSec, stationOn } from './support/stationOn';

/** A data server without room: a small file system in memory is in the place of the directory of its tables. */
const FULL = 'data2';
const ROOM_MIB = 16;
const MORE_ROOM_MIB = 128;
const POST_INTERVALS = 2000;
const MOST_POSTS = 200;
const COMPUTED = { timeout: 60_000, interval: 500 };
const layout = testCluster();
useFreshSchema();
let directory: string;
let usedMiB: number;
let isSmall: boolean;
let ofFull: PostingStation;
let ofOther: PostingStation;

beforeAll(async () => {
  const networkId = await makeNetwork('quay');
  ofFull = await stationOn(networkId, FULL);
  ofOther = await stationOn(networkId, 'data1');
  await closeDb();
  directory = join(databaseDirectory(layout, FULL), 'data', config().database.name);
  usedMiB = Number.parseInt(
    execFileSync('du', ['--summarize', '--block-size=1M', directory], { encoding: 'utf8' }),
  );
  await inOtherPlace(() => (isSmall = mount(`size=${usedMiB + ROOM_MIB}m`)));
  await startBittern(RECEIVER);
}, 120_000);

afterAll(async () => {
  await stopBittern();
  await closeDb();
  if (isSmall) await inOtherPlace(() => spawnSync('umount', [directory]));
}, 120_000);

/** Changes what file system the tables lie on, while their server is stopped. */
async function inOtherPlace(change: () => void): Promise<void> {
  const kept = `${directory}.kept`;
  await stopProcess(layout, FULL);
  execFileSync('cp', ['--archive', directory, kept]);
  for (const name of readdirSync(directory)) rmSync(join(directory, name));
  change();
  execFileSync('cp', ['--archive', `${kept}/.`, directory]);
  rmSync(kept, { recursive: true });
  await startDatabases(layout);
}

function mount(options: string): boolean {
  return spawnSync('mount', ['-t', 'tmpfs', '-o', options, 'tmpfs', directory]).status === 0;
}

test.skipIf(process.env['CLUSTER'] !== 'whole')(
  'the disk of a data server fills up: its posts are told to come again, others are taken and computed, and with room all goes on',
  async (context) => {
    if (!isSmall) context.skip('a file system in memory cannot be mounted by this account');
    let refused: Batch | undefined;
    for (let posts = 0; posts < MOST_POSTS && !refused; posts += 1) {
      const batch = ofFull.nextBatch(POST_INTERVALS);
      if (!(await ofFull.post(batch))) refused = batch;
    }
    expect(refused).toBeDefined();
    expect(await ofOther.post(ofOther.nextBatch(POST_INTERVALS))).toBe(true);
    await expect.poll(() => computedSec(ofOther), COMPUTED).toBe(POST_INTERVALS * 60);

    mount(`remount,size=${usedMiB + ROOM_MIB + MORE_ROOM_MIB}m`);
    // The server ends by itself where it has no room to take back what it could not write.
    console.log(`the full server ${pidOf(layout, FULL) === null ? 'ended and is started again' : 'runs on'}`);
    await startDatabases(layout);
    if (refused) await ofFull.postUntilTaken(refused);
    for (const station of [ofFull, ofOther]) await station.expectNothingLost();
    await expect.poll(() => db()('dirty_marks').first('id'), COMPUTED).toBeUndefined();
    const [stored] = await db()('interval_levels')
      .where({ station_id: ofFull.stationId })
      .count({ count: '*' });
    expect(await computedSec(ofFull)).toBe(Number(stored?.['count']) * 60);
  },
  240_000,
);
