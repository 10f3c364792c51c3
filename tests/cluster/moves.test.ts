import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { onEach, type DataServer } from '#db/sharding/dataServers';
import { bucketOf, bucketTable, KINDS } from '#db/sharding/kinds';
import { httpPort } from '#ops/cluster/layout';
import { moveBucket, placesOfBuckets } from '#ops/cluster/moveBucket';
import { config } from '#lib/config/index';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makePostingStations, RECEIVER, startBittern, stopBittern } from './support/bittern';
import { testCluster } from './support/cluster';
import { Posting } from './support/posting';

const STATIONS = 3;
const MOST_HELD_MS = 15_000;

useFreshSchema();
const layout = testCluster();
let stationIds: Map<string, number>;

beforeAll(async () => {
  stationIds = await makePostingStations('MOVE', STATIONS);
  await startBittern(RECEIVER);
}, 120_000);

afterAll(async () => {
  await stopBittern();
  await closeDb();
}, 60_000);

test('a bucket moves while its station posts: nothing acknowledged is lost, and the old copy is gone', async () => {
  const posting = new Posting(`http://127.0.0.1:${httpPort(layout)}`, [...stationIds.keys()]);
  const [stationId = NaN] = stationIds.values();
  const bucket = bucketOf(stationId);
  try {
    await posting.untilMore(3 * STATIONS, 60_000);
    const from = (await placesOfBuckets())[bucket];
    const to = config().database.dataServers.find(({ name }) => name !== from?.name);
    if (!from || !to) throw new Error('There is nowhere to move it to.');
    const heldMs = await moveBucket(bucket, to);
    console.log(`held for ${Math.round(heldMs)} ms`);
    expect(heldMs).toBeLessThan(MOST_HELD_MS);
    expect((await placesOfBuckets())[bucket]?.name).toBe(to.name);
    expect(await tablesOf(bucket, from)).toBe(0);
    expect(await tablesOf(bucket, to)).toBe(KINDS.length);
    await posting.untilMore(3 * STATIONS, 60_000);
    // Called again, it finds nothing to do.
    expect(await moveBucket(bucket, to)).toBe(0);
  } finally {
    await posting.stop();
  }
  console.log(`other answers: ${JSON.stringify([...posting.otherwise])}`);
  await closeDb();
  for (const [token, starts] of posting.acknowledged) {
    const stored: number[] = await db()('interval_levels')
      .where({ station_id: stationIds.get(token) ?? NaN })
      .pluck('starts_at');
    expect(starts.filter((startSec) => !stored.includes(startSec))).toEqual([]);
    expect(new Set(stored).size).toBe(stored.length);
  }
}, 240_000);

async function tablesOf(bucket: number, server: DataServer): Promise<number> {
  const [count = NaN] = await onEach([server], async (connection) => {
    const [rows] = await connection.query(
      'SELECT COUNT(*) AS count FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name IN (?)',
      [KINDS.map((kind) => bucketTable(kind, bucket))],
    );
    return Number((rows as { count: number }[])[0]?.count);
  });
  return count;
}
