import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import mysql from 'mysql2/promise';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { migrateUp } from '#db/migrateUp';
import { SharingWorker } from '#ingest/sharing/sharingWorker';
import { limitTrialSchema } from '#lib/contracts/limitTrial';
import { runTrial } from '#lib/services/limitTrial/runTrial';
import { readHeavy } from '#lib/services/reading/readHeavy';
import { makeNetwork, makeStation } from '#ops/bench/support/station';
import { freePorts } from '#ops/bench/support/soak/ports';
import { startDatabase, type DatabasePlace, type DatabaseServer } from '#ops/database/server';
import { inSnapshot, pool } from '#db/queries/connection';

/** Heavy reads at a real replica: while it follows, while it lags behind, and while it is away. */
const directory = mkdtempSync(join(tmpdir(), 'bittern-replica-'));
const NAME = 'faults';
/** What the settings allow here. */
const MOST_AGE_SEC = 15;
const worker = new SharingWorker();
const servers: Record<'primary' | 'replica', DatabaseServer | undefined> = {
  primary: undefined,
  replica: undefined,
};
let places: Record<'primary' | 'replica', DatabasePlace>;

const placeOf = (name: string, port: number, options: string[]): DatabasePlace => ({
  directory: join(directory, name),
  port,
  user: 'owner',
  password: 'test',
  bufferPoolMiB: 64,
  options,
});

async function ask(name: 'primary' | 'replica', ...statements: string[]): Promise<void> {
  const connection = await mysql.createConnection({
    socketPath: join(places[name].directory, 'socket'),
    user: 'root',
    password: 'test',
  });
  for (const statement of statements) await connection.query(statement);
  await connection.end();
}

beforeAll(async () => {
  const [port = 0, replicaPort = 0] = await freePorts(2);
  places = {
    primary: placeOf('primary', port, [
      '--server-id=1',
      '--log-bin=binlog',
      '--binlog-format=ROW',
      '--log-bin-trust-function-creators=1',
    ]),
    replica: placeOf('replica', replicaPort, ['--server-id=2', '--read-only', `--replicate-do-db=${NAME}`]),
  };
  for (const name of ['primary', 'replica'] as const) servers[name] = await startDatabase(places[name]);
  await ask('primary', `CREATE DATABASE ${NAME} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`);
  for (const name of ['primary', 'replica'] as const) {
    await ask(
      name,
      `CREATE USER web@'127.0.0.1' IDENTIFIED BY 'test'`,
      `GRANT ALL PRIVILEGES ON ${NAME}.* TO web@'127.0.0.1'`,
    );
  }
  await ask(
    'replica',
    `CHANGE MASTER TO MASTER_HOST = '127.0.0.1', MASTER_PORT = ${port}, MASTER_USER = 'owner', MASTER_PASSWORD = 'test', MASTER_CONNECT_RETRY = 1, MASTER_USE_GTID = slave_pos`,
    'START SLAVE',
  );
  Object.assign(process.env, {
    BITTERN_DB_HOST: '127.0.0.1',
    BITTERN_DB_PORT: String(port),
    BITTERN_DB_USER: 'web',
    BITTERN_DB_PASSWORD: 'test',
    BITTERN_DB_NAME: NAME,
    BITTERN_DB_READ_HOST: '127.0.0.1',
    BITTERN_DB_READ_PORT: String(replicaPort),
    BITTERN_DB_READ_MAX_AGE_SEC: String(MOST_AGE_SEC),
  });
  await migrateUp();
  await worker.join();
});

afterAll(async () => {
  await worker.leave();
  await closeDb();
  await servers.replica?.stop();
  await servers.primary?.stop();
  rmSync(directory, { recursive: true, force: true });
});

const heavy = () =>
  readHeavy(async () => {
    const [[row]] = (await pool().raw('SELECT @@server_id AS id')) as [{ id: number }[]];
    return row?.id;
  });

async function until(serverId: number): Promise<Awaited<ReturnType<typeof heavy>>> {
  for (let wait = 0; wait < 120; wait += 1) {
    const read = await heavy();
    if (read.answer === serverId) return read;
    await sleep(500);
  }
  throw new Error(`Nothing was read from server ${serverId} within a minute.`);
}

test('while it follows, heavy reads are the replica’s and say of when they are; everything else is not', async () => {
  const { dataAsOf } = await until(2);
  expect(Math.abs(Date.now() - Number(dataAsOf))).toBeLessThan(MOST_AGE_SEC * 1000);
  const [[row]] = (await db().raw('SELECT @@server_id AS id')) as [{ id: number }[]];
  expect(row?.id).toBe(1);
  const inside = await readHeavy(async () => {
    const [[mine]] = (await db().raw('SELECT @@server_id AS id')) as [{ id: number }[]];
    return mine?.id;
  });
  expect(inside.answer, 'transactions stay at the database').toBe(1);
});

test('a file of one moment is read there, too', async () => {
  await until(2);
  const { answer } = await readHeavy(() =>
    inSnapshot(async (snapshot) => {
      const [[row]] = (await snapshot.raw('SELECT @@server_id AS id')) as [{ id: number }[]];
      return row?.id;
    }),
  );
  expect(answer).toBe(2);
});

test.each([
  ['within the process', '2026-01-15'],
  ['in a thread of its own', '2026-03-15'],
])('a trial of a limit %s says of when its data are', async (_, to) => {
  const networkId = await makeNetwork(`trial-${to}`);
  await makeStation(networkId, 'TR-1', 60);
  const limit = { name: 'Night', metric: 'LAeq', threshold: 50, window: 'length', windowMinutes: 10 };
  const query = limitTrialSchema.parse({ limit, from: '2026-01-01', to });
  const task = { networkId, query, nowSec: Math.floor(Date.now() / 1000) };
  // What it is about has to have arrived.
  await worker.refresh();
  await sleep(2_500);
  const outcome = await runTrial(task);
  const answer = outcome.kind === 'done' ? outcome.value : expect.fail(JSON.stringify(outcome));
  const dataAsOf = new Date(answer.dataAsOf ?? expect.fail('It was read from the database itself.'));
  expect(Math.abs(Date.now() - Number(dataAsOf))).toBeLessThan(MOST_AGE_SEC * 1000);
});

test('what it would write is read and written at the database itself', async () => {
  const written = await readHeavy(() =>
    pool()('leases').insert({ name: 'w', holder: 'x', taken_at: 1, expires_at: 1 }),
  );
  expect(written.dataAsOf).toBeNull();
  expect(await db()('leases').where({ name: 'w' }).first()).toBeDefined();
});

test('a replica that is too far behind is not read from, and is again once it has caught up', async () => {
  await until(2);
  await ask('replica', 'STOP SLAVE SQL_THREAD');
  const behind = await until(1);
  expect(behind.dataAsOf).toBeNull();
  await worker.refresh();
  await ask('replica', 'START SLAVE SQL_THREAD');
  expect((await until(2)).dataAsOf).not.toBeNull();
});

test('a replica that is gone is done without, within seconds', async () => {
  await servers.replica?.stop();
  const since = performance.now();
  expect(await heavy()).toEqual({ answer: 1, dataAsOf: null });
  expect(performance.now() - since).toBeLessThan(5_000);
  servers.replica = await startDatabase(places.replica);
  expect((await until(2)).answer).toBe(2);
});
