import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb } from '#db/client';
import { httpPort } from '#ops/cluster/layout';
import { killProcess } from '#ops/cluster/processes';
import { startDatabases } from '#ops/cluster/programs';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makePostingStations, RECEIVER, startBittern, stopBittern } from './support/bittern';
import { testCluster } from './support/cluster';
import { Posting } from './support/posting';
import { expectAllThere } from './support/stored';

const STATIONS = 8;
/** `CLUSTER=whole` kills each of each kind, and the others after it is back. */
const VICTIMS =
  process.env['CLUSTER'] === 'whole'
    ? ['head1', 'head2', 'head3', 'head1', 'data1', 'data2', 'web1', 'web2', 'worker1', 'worker2', 'proxy']
    : ['head1', 'data1', 'web1', 'worker1'];
const DOWN_MS = 2_000;
const RESUMED_WITHIN_MS = 60_000;

useFreshSchema();
const layout = testCluster();
let stationIds: Map<string, number>;

beforeAll(async () => {
  stationIds = await makePostingStations('KILL', STATIONS);
  await startBittern(RECEIVER);
}, 120_000);

afterAll(async () => {
  await stopBittern();
  await closeDb();
}, 60_000);

test('any one may die under load: nothing acknowledged is lost or doubled, and posts go on by themselves', async () => {
  const posting = new Posting(`http://127.0.0.1:${httpPort(layout)}`, [...stationIds.keys()]);
  const told: string[] = [];
  try {
    await posting.untilMore(2 * STATIONS, RESUMED_WITHIN_MS);
    for (const victim of VICTIMS) {
      const killedMs = performance.now();
      expect(killProcess(layout, victim), `${victim} ran`).toBe(true);
      await sleep(DOWN_MS);
      // A data server has to come back; of all others there is another one.
      if (victim.startsWith('data') || victim === 'proxy') await startDatabases(layout);
      await posting.untilMore(3 * STATIONS, RESUMED_WITHIN_MS);
      told.push(`${victim} ${(posting.longestGapMs(killedMs) / 1000).toFixed(1)} s`);
      await startDatabases(layout);
      await startBittern(RECEIVER);
      await posting.untilMore(STATIONS, RESUMED_WITHIN_MS);
    }
  } finally {
    await posting.stop();
  }
  console.log(`longest time without an acknowledged post: ${told.join(', ')}`);
  console.log(`other answers: ${JSON.stringify([...posting.otherwise])}`);
  // Our own connections were cut off, too.
  await closeDb();
  await expectAllThere(posting, stationIds);
}, 600_000);
