import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import mysql from 'mysql2/promise';
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { startDatabase, type DatabasePlace, type DatabaseServer } from '#ops/database/server';
import { callApi } from '../support/callApi';
import { makeNetwork, makeStation } from '../support/people';

/** A MariaDB of this file's own, which it may stop. */
let place: DatabasePlace;
let server: DatabaseServer;
let owner: mysql.Connection;
let token: string;
let minute = 0;

beforeAll(async () => {
  const directory = mkdtempSync(join(tmpdir(), 'bittern-away-db-'));
  place = { directory, port: await freePort(), user: 'owner', password: 'test', bufferPoolMiB: 128 };
  server = await startDatabase(place);
  await connectOwner();
  await owner.query('CREATE DATABASE away');
  // Without the right to write to a server that is read-only, or to come in when it is full of connections.
  await owner.query(`CREATE USER web@'127.0.0.1' IDENTIFIED BY 'test'`);
  await owner.query(`GRANT ALL PRIVILEGES ON away.* TO web@'127.0.0.1'`);
  Object.assign(process.env, {
    BITTERN_DB_PORT: String(place.port),
    BITTERN_DB_USER: 'web',
    BITTERN_DB_PASSWORD: 'test',
    BITTERN_DB_NAME: 'away',
  });
  await db().migrate.latest();
  const stationId = await makeStation(await makeNetwork('quay'), 'QY-1');
  token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
}, 120_000);

afterEach(() => closeDb());

afterAll(async () => {
  await owner.end().catch(() => undefined);
  await server.stop();
  rmSync(place.directory, { recursive: true, force: true });
});

async function freePort(): Promise<number> {
  const probe = createServer();
  await new Promise<void>((listening) => probe.listen(0, '127.0.0.1', listening));
  const { port } = probe.address() as AddressInfo;
  await new Promise((closed) => probe.close(closed));
  return port;
}

const connect = () =>
  mysql.createConnection({ host: '127.0.0.1', port: place.port, user: place.user, password: place.password });

/** As root: the owner of all data may give away no rights. */
async function connectOwner(): Promise<void> {
  const socketPath = join(place.directory, 'socket');
  owner = await mysql.createConnection({ socketPath, user: 'root', password: place.password });
  owner.on('error', () => undefined);
}

function nextPost() {
  minute += 1;
  const start = new Date(Date.UTC(2026, 2, 1, 0, minute)).toISOString();
  return { bands: [100, 125], intervals: [{ start, seconds: 60, LAeq: 52.3, levels: [48, 47] }] };
}

const post = (body: unknown) => callApi('POST', '/api/v1/intervals', { token, body });
const storedCount = async () => {
  const [rows] = await owner.query('SELECT COUNT(*) AS count FROM away.interval_levels');
  return (rows as { count: number }[])[0]?.count;
};

/** Not now, and nothing kept; afterwards the same post is taken, by the same process. */
async function expectRefusedUntil(recovered: () => Promise<unknown>, count = () => storedCount()) {
  const body = nextPost();
  const refused = await post(body);
  expect(refused.status).toBe(503);
  expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(0);
  expect(refused.headers.get('content-type')).toBe('application/problem+json');
  await recovered();
  const before = await count();
  const taken = await post(body);
  expect(taken.status).toBe(200);
  expect(await taken.json()).toMatchObject({ accepted: 1, known: 0 });
  expect(await count()).toBe((before ?? 0) + 1);
}

test.each([
  [1114, 'the table is full'],
  [1021, 'the disk is full'],
  [1030, 'got error 28 from the storage engine'],
  [1205, 'a lock is not granted in time'],
  [1213, 'a deadlock again and again'],
  [1180, 'the commit fails'],
])('error %i, %s: 503, and taken when that is over', async (errno, text) => {
  await owner.query(
    `CREATE TRIGGER away.fails BEFORE INSERT ON away.dirty_marks FOR EACH ROW
     SIGNAL SQLSTATE 'HY000' SET MYSQL_ERRNO = ${errno}, MESSAGE_TEXT = '${text}'`,
  );
  await expectRefusedUntil(() => owner.query('DROP TRIGGER away.fails'));
});

test('a server that is read-only: 503, and taken when it is not', async () => {
  await owner.query('SET GLOBAL read_only = 1');
  await expectRefusedUntil(() => owner.query('SET GLOBAL read_only = 0'));
});

test('a server full of connections: 503, and taken when there is room', async () => {
  await closeDb();
  await owner.query('SET GLOBAL max_connections = 10');
  const others = await Promise.all(Array.from({ length: 9 }, connect));
  await expectRefusedUntil(async () => {
    await Promise.all(others.map((other) => other.end()));
    await owner.query('SET GLOBAL max_connections = DEFAULT');
  });
});

test('a server that is killed: 503 for posts and questions, and taken when it is back', async () => {
  expect((await post(nextPost())).status).toBe(200);
  const ended = new Promise((resolve) => server.process.once('exit', resolve));
  server.process.kill('SIGKILL');
  await ended;
  expect((await callApi('GET', '/api/v1/intervals/last', { token })).status).toBe(503);
  await expectRefusedUntil(async () => {
    server = await startDatabase(place);
    await connectOwner();
  });
  expect((await callApi('GET', '/api/v1/intervals/last', { token })).status).toBe(200);
});
