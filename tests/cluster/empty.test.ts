import type { RowDataPacket } from 'mysql2/promise';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb } from '#db/client';
import { dataServers, onEach, type DataServer } from '#db/sharding/dataServers';
import { bucketOf, BUCKETS, KINDS } from '#db/sharding/kinds';
import { httpPort } from '#ops/cluster/layout';
import { emptyServer, placesOfBuckets } from '#ops/cluster/moveBucket';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makePostingStations, RECEIVER, startBittern, stopBittern } from './support/bittern';
import { testCluster } from './support/cluster';
import { Posting } from './support/posting';
import { expectAllThere } from './support/stored';

const isWhole = process.env['CLUSTER'] === 'whole';
const STATIONS = 6;
const WITHIN_MS = 60_000;
/** Of any monitor: one whose bucket is held waits, or is asked to come again. */
const LONGEST_GAP_MS = 15_000;

useFreshSchema();
const layout = testCluster();
let stationIds: Map<string, number>;

beforeAll(async () => {
  if (!isWhole) return;
  stationIds = await makePostingStations('EMPTY', STATIONS);
  await startBittern(RECEIVER);
}, 120_000);

afterAll(async () => {
  await stopBittern();
  await closeDb();
}, 60_000);

test.skipIf(!isWhole)(
  'a data server is emptied under load: nothing acknowledged is lost or doubled, and posts go on by themselves',
  async () => {
    const from = await serverInUse();
    const posting = new Posting(`http://127.0.0.1:${httpPort(layout)}`, [...stationIds.keys()]);
    try {
      await posting.untilMore(3 * STATIONS, WITHIN_MS);
      expect(await tablesOn(from), 'it had buckets').toBeGreaterThan(KINDS.length);
      const begunMs = performance.now();
      const moved = await emptied(from);
      const tookMs = performance.now() - begunMs;
      await posting.untilMore(3 * STATIONS, WITHIN_MS);
      tell(moved, tookMs, posting, begunMs);
      expect(posting.longestGapOfOneMs(begunMs)).toBeLessThan(LONGEST_GAP_MS);
    } finally {
      await posting.stop();
    }
    await closeDb();
    await expectNothingLeft(from);
    await expectAllThere(posting, stationIds);
    // Called again, it finds nothing to do.
    expect(await emptied(from)).toEqual([]);
  },
  600_000,
);

/** The server of the first station; some other station stands elsewhere, so that both kinds of posts are looked at. */
async function serverInUse(): Promise<DataServer> {
  const places = await placesOfBuckets();
  const used = [...stationIds.values()].map((id) => places[bucketOf(id)] as DataServer);
  const [first] = used;
  if (!first) throw new Error('There are no stations.');
  expect(
    used.some(({ name }) => name !== first.name),
    'stations are on both servers',
  ).toBe(true);
  return first;
}

/** Empties a server. @returns what was told of each bucket. */
async function emptied(from: DataServer): Promise<string[]> {
  const told: string[] = [];
  await emptyServer(from, (line) => told.push(line));
  return told;
}

async function expectNothingLeft(from: DataServer): Promise<void> {
  const places = await placesOfBuckets();
  expect(places.filter(({ name }) => name === from.name)).toEqual([]);
  expect(await tablesOn(from), 'left where it was emptied').toBe(0);
  const others = dataServers().filter(({ name }) => name !== from.name);
  let count = 0;
  for (const other of others) count += await tablesOn(other);
  expect(count, 'tables on the others').toBe(BUCKETS * KINDS.length);
}

/** How many tables of any name a server has of ours, those that a move has set aside or notes in included. */
async function tablesOn(server: DataServer): Promise<number> {
  const [count = NaN] = await onEach([server], async (connection) => {
    const [[row]] = await connection.query<RowDataPacket[]>(
      'SELECT COUNT(*) AS count FROM information_schema.tables WHERE table_schema = DATABASE()',
    );
    return Number(row?.['count']);
  });
  return count;
}

function tell(moved: readonly string[], tookMs: number, posting: Posting, begunMs: number): void {
  const heldMs = moved.map((line) => Number(/held (\d+) ms/.exec(line)?.[1]));
  const seconds = (ms: number) => `${(ms / 1000).toFixed(1)} s`;
  console.log(
    `${moved.length} buckets moved in ${seconds(tookMs)}, each held for at most ${Math.max(...heldMs)} ms; longest time without an acknowledged post: ` +
      `${seconds(posting.longestGapMs(begunMs))} of all stations, ${seconds(posting.longestGapOfOneMs(begunMs))} of one`,
  );
  console.log(`other answers: ${JSON.stringify([...posting.otherwise])}`);
}
