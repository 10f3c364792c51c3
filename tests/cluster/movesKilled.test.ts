import { spawn } from 'node:child_process';
import { once } from 'node:events';
import type { RowDataPacket } from 'mysql2/promise';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { dataServers, onEach, type DataServer } from '#db/sharding/dataServers';
import { bucketOf, bucketTable, KINDS } from '#db/sharding/kinds';
import { fill, makeNetwork, makeStation } from '#ops/bench/support/station';
import { moveBucket, placesOfBuckets } from '#ops/cluster/moveBucket';
import { useFreshSchema } from '../integration/support/freshSchema';

const FIRST_SEC = Date.parse('2025-06-05T00:00:00Z') / 1000;
const WEEK_SEC = 7 * 86_400;

/** The statement that the mover is killed at, how many of its kind it was let through before, and whether the bucket can be used afterwards. */
interface Stage {
  pattern: string;
  letThrough: number;
  isUsable: boolean;
}

const STAGES: Record<string, Stage> = {
  'the parts are listed': { pattern: '^CREATE TABLE moving_.._ready', letThrough: 0, isUsable: true },
  'a part is half copied': { pattern: '^INSERT INTO ', letThrough: 2, isUsable: true },
  'some parts are compared': { pattern: '^DELETE FROM moving_', letThrough: 2, isUsable: true },
  'it is to be held': { pattern: '^LOCK TABLES', letThrough: 0, isUsable: true },
  'half of it is out of reach': { pattern: 'RENAME TO left_', letThrough: 4, isUsable: false },
  'all of it is out of reach': { pattern: '^UNLOCK TABLES', letThrough: 0, isUsable: false },
  'new links are made': { pattern: '^RENAME TABLE', letThrough: 0, isUsable: false },
  'the head leads to the new copy': {
    pattern: '^DROP TABLE IF EXISTS moving_',
    letThrough: 1,
    isUsable: true,
  },
};
const isWhole = process.env['CLUSTER'] === 'whole';
const SHORT = ['half of it is out of reach'];
const stages = Object.entries(STAGES).filter(([name]) => isWhole || SHORT.includes(name));

useFreshSchema();
let stationId: number;
let bucket: number;
let nextQuarterSec = FIRST_SEC;

beforeAll(async () => {
  const station = await makeStation(await makeNetwork(), 'CUT', 60);
  stationId = station.id;
  bucket = bucketOf(stationId);
  await fill(stationId, FIRST_SEC, 900, 60);
  await fill(stationId, FIRST_SEC + WEEK_SEC, 300, 60);
  await db()('station_locks').insert({ station_id: stationId }).onConflict().ignore();
  await change();
});

test.each(stages)(
  'a mover killed when %s goes on when called again, and every row is there once',
  async (_, stage) => {
    const { from, to } = await places();
    const before = await rowsOf();
    await killMoverAt(stage, to);
    if (stage.isUsable) {
      expect(await rowsOf()).toEqual(before);
      await change();
    } else await expect(rowsOf()).rejects.toThrow();
    const expected = stage.isUsable ? await rowsOf() : before;
    await moveBucket(bucket, to);
    expect(await rowsOf()).toEqual(expected);
    expect((await placesOfBuckets())[bucket]?.name).toBe(to.name);
    expect(await tablesAt(from)).toEqual([]);
    expect(await tablesAt(to)).toEqual(KINDS.map((kind) => bucketTable(kind, bucket)).sort());
    expect(await triggersAt(to)).toBe(0);
  },
);

test.runIf(isWhole)('a move that was broken off is taken back, and begins anew', async () => {
  const { from, to } = await places();
  const before = await rowsOf();
  await killMoverAt(STAGES['some parts are compared'] as Stage, to);
  await moveBucket(bucket, from);
  expect(await rowsOf()).toEqual(before);
  expect([await tablesAt(to), await triggersAt(from)]).toEqual([[], 0]);
  await killMoverAt(STAGES['all of it is out of reach'] as Stage, to);
  await moveBucket(bucket, from);
  expect(await rowsOf()).toEqual(before);
  await moveBucket(bucket, to);
  expect(await rowsOf()).toEqual(before);
});

test.runIf(isWhole)('a move that was begun to one server does not go on to another', async () => {
  const { from, to } = await places();
  await killMoverAt(STAGES['it is to be held'] as Stage, to);
  await expect(moveBucket(bucket, { ...to, name: 'data9' })).rejects.toThrow('broken off');
  await moveBucket(bucket, from);
});

async function places(): Promise<{ from: DataServer; to: DataServer }> {
  const from = (await placesOfBuckets())[bucket];
  const to = dataServers().find(({ name }) => name !== from?.name);
  if (!from || !to) throw new Error('There is nowhere to move it to.');
  return { from, to };
}

async function killMoverAt({ pattern, letThrough }: Stage, to: DataServer): Promise<void> {
  const script = ['--import', 'tsx', 'tests/cluster/support/moveUntil.ts'];
  const child = spawn(process.execPath, [...script, String(bucket), to.name, pattern, String(letThrough)], {
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  const [, signal] = (await once(child, 'close')) as [number | null, NodeJS.Signals | null];
  expect(signal, 'it was killed').toBe('SIGKILL');
}

/** Adds a mark and rows of both weeks, changes one and takes some away, as people and monitors do while a bucket moves. */
async function change(): Promise<void> {
  const levels = () => db()('interval_levels').where({ station_id: stationId });
  await db()('dirty_marks').insert({
    station_id: stationId,
    quarter_starts_at: nextQuarterSec,
    marked_at: 1,
  });
  await levels().where('starts_at', nextQuarterSec).increment('laeq_centi_db', 100);
  await levels()
    .where('starts_at', nextQuarterSec + 60)
    .delete();
  await levels()
    .where('starts_at', nextQuarterSec + WEEK_SEC)
    .delete();
  await fill(stationId, nextQuarterSec + 2 * WEEK_SEC, 2, 60);
  nextQuarterSec += 900;
}

async function rowsOf(): Promise<Record<string, unknown>> {
  const rows: Record<string, unknown> = {};
  for (const kind of KINDS) {
    const order = kind === 'dirty_marks' ? 'id' : kind === 'interval_levels' ? 'starts_at' : 'station_id';
    rows[kind] = await db()(kind).where({ station_id: stationId }).orderBy(order).select('*');
  }
  return rows;
}

/** What a server has of the bucket, in reach, out of it, or noted. */
async function tablesAt(server: DataServer): Promise<string[]> {
  const [names = []] = await onEach([server], async (connection) => {
    const [rows] = await connection.query<RowDataPacket[]>(
      'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name REGEXP ? ORDER BY table_name',
      [`_${String(bucket).padStart(2, '0')}(_|$)`],
    );
    return rows.map(({ name }) => String(name));
  });
  return names;
}

async function triggersAt(server: DataServer): Promise<number> {
  const [count = NaN] = await onEach([server], async (connection) => {
    const [[row]] = await connection.query<RowDataPacket[]>(
      'SELECT COUNT(*) AS count FROM information_schema.triggers WHERE trigger_schema = DATABASE() AND event_object_table REGEXP ?',
      [`_${String(bucket).padStart(2, '0')}$`],
    );
    return Number(row?.['count']);
  });
  return count;
}
