import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { inTransaction, pool } from '#db/queries/connection';
import { insertIntervals } from '#db/queries/intervals';
import { SharingWorker } from '#ingest/sharing/sharingWorker';
import { intervalsCsv } from '#lib/services/intervals/csv';
import { readHeavy } from '#lib/services/reading/readHeavy';
import { invent, makeNetwork, makeStation } from '#ops/bench/support/station';
import { nodePorts, readPort } from '#ops/cluster/layout';
import { killProcess } from '#ops/cluster/processes';
import { startDatabases } from '#ops/cluster/programs';
import { useFreshSchema } from '../integration/support/freshSchema';
import { testCluster } from './support/cluster';

/** Heavy reads on a cluster: at nodes of the head that nobody writes to. */
const layout = testCluster();
// Before the settings are read for the first time.
Object.assign(process.env, {
  BITTERN_DB_READ_HOST: '127.0.0.1',
  BITTERN_DB_READ_PORT: String(readPort(layout)),
});
useFreshSchema();
const worker = new SharingWorker();
const FIRST_SEC = Date.parse('2025-06-01T00:00:00Z') / 1000;
const INTERVALS = 60;
const [first, second, third] = [1, 2, 3].map((number) => nodePorts(layout, number).sql);
let networkId: number;

beforeAll(async () => {
  networkId = await makeNetwork();
  await worker.join();
});

afterAll(async () => {
  delete process.env['BITTERN_DB_READ_HOST'];
  await startDatabases(layout);
  await worker.leave();
  await closeDb();
}, 60_000);

/** The port of the node that a new connection writes to; one made while the first was away keeps to the second. */
async function portWritten(): Promise<number | undefined> {
  await closeDb();
  const [[row]] = (await db().raw('SELECT @@port AS port')) as [{ port: number }[]];
  return row?.port;
}

/** The port of the node that something is read from. */
async function portRead(): Promise<number | undefined> {
  const [[row]] = (await pool().raw('SELECT @@port AS port')) as [{ port: number }[]];
  return row?.port;
}

test('heavy reads come from another node than what is written, and find what was just acknowledged', async () => {
  await expect.poll(portWritten, { timeout: 30_000, interval: 1_000 }).toBe(first);
  const station = await makeStation(networkId, 'READ-1', 60);
  const intervals = await invent(FIRST_SEC, INTERVALS, 60);
  await inTransaction((transaction) => insertIntervals(station.id, intervals, transaction));
  const period = { fromSec: FIRST_SEC, toSec: FIRST_SEC + 60 * INTERVALS };
  const { answer, dataAsOf } = await readHeavy(async () => ({
    port: await portRead(),
    csv: await intervalsCsv(station, period),
  }));
  expect(answer.csv.trim().split('\r\n')).toHaveLength(1 + INTERVALS);
  expect([second, third]).toContain(answer.port);
  expect(dataAsOf).not.toBeNull();
});

test('a node that heavy reads come from dies: the next answers', async () => {
  await readHeavy(portRead);
  expect(killProcess(layout, 'head2')).toBe(true);
  for (let times = 0; times < 8; times += 1) {
    expect([first, third]).toContain((await readHeavy(portRead)).answer);
    await sleep(500);
  }
  await expect.poll(async () => (await readHeavy(portRead)).answer, { timeout: 30_000 }).toBe(third);
});
