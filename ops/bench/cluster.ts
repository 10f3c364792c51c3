import { spawn } from 'node:child_process';
import { once } from 'node:events';
import mysql from 'mysql2/promise';
import { closeDb, db } from '#db/client';
import { inTransaction, pool } from '#db/queries/connection';
import { listSettings } from '#db/queries/networks';
import { connectTo, dataServers } from '#db/sharding/dataServers';
import { dropShards } from '#db/sharding/dropShards';
import { bucketOf, bucketTable } from '#db/sharding/kinds';
import type { StationRow } from '#db/queries/stations';
import { shardTables } from '#db/sharding/shardTables';
import { connectionSettings } from '#db/settings';
import { currentSums } from '#lib/services/levels/currentSums';
import { compare, digits, median, printTable } from './support/measure';
import { FIRST_SEC, fillMonth, MONTH_SEC } from './support/months';
import { insertStatement } from './support/rawInsert';
import { withOwnSchema } from './support/schema';
import { invent, makeNetwork, makeStation } from './support/station';

/**
 * What a cluster takes of packed intervals in a second, on 1, 2 and 4 data servers, through the head against straight into a bucket's table; and how long a
 * station's month of figures takes; and what small transactions cost that hold the gate of links (decision 0092) against ones that do not. All servers share
 * this machine's processors: more of them tell what sharing out costs here, not what it gains.
 * `npx tsx ops/bench/cluster.ts` with the settings of a running cluster of four: `ops/cluster.sh up --data 4 --only-databases`.
 */
const COUNTS = [1, 2, 4];
const SENDERS = 4;
const STATEMENTS = 10;
const ROWS = 600;
const TURNS = 3;
/** Transactions of one interval, of each sender. */
const SMALL = 60;
const HEADS = [
  'data servers',
  'intervals/s through the head',
  'intervals/s straight',
  'ratio',
  'month of figures ms',
  'transactions/s with the gate',
  'ratio',
];

if (process.argv[2] === 'one') await one();
else await all();

async function all(): Promise<void> {
  const servers = (process.env['BITTERN_DATA_SERVERS'] ?? '').split(',').filter((item) => item !== '');
  for (const count of COUNTS.filter((some) => some <= servers.length)) {
    const child = spawn(process.execPath, ['--import', 'tsx', 'ops/bench/cluster.ts', 'one'], {
      env: { ...process.env, BITTERN_DATA_SERVERS: servers.slice(0, count).join(',') },
      stdio: ['ignore', 'inherit', 'inherit'],
    });
    await once(child, 'close');
  }
}

async function one(): Promise<void> {
  await withOwnSchema(async () => {
    await shardTables();
    try {
      const networkId = await makeNetwork();
      const figuresMs = await monthOfFigures(networkId);
      const { ms, againstMs } = await ingest(networkId);
      const gated = await gate(networkId);
      const perSec = (took: number[]) => (SENDERS * STATEMENTS * ROWS * 1000) / median(took);
      printTable(HEADS, [
        [
          digits(dataServers().length),
          digits(perSec(ms)),
          digits(perSec(againstMs)),
          digits(perSec(ms) / perSec(againstMs)),
          digits(figuresMs),
          digits((SENDERS * SMALL * 1000) / median(gated.ms)),
          digits(median(gated.againstMs) / median(gated.ms)),
        ],
      ]);
    } finally {
      await dropShards();
      await closeDb();
    }
  });
}

async function monthOfFigures(networkId: number): Promise<number> {
  const station = await makeStation(networkId, 'FIGURES', 60);
  await fillMonth(station);
  const source = { station, timeline: await listSettings(networkId), validity: 'rules' as const };
  const period = { fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC };
  const ask = () => currentSums(source, period, { bandClasses: true }, pool());
  return median((await compare(TURNS, ask, async () => undefined)).ms);
}

async function ingest(networkId: number) {
  const stations: StationRow[] = [];
  for (let at = 0; at < SENDERS; at += 1) stations.push(await makeStation(networkId, `POSTED-${at}`, 60));
  const connections = await Promise.all(
    stations.map(() => mysql.createConnection(connectionSettings().connection as mysql.ConnectionOptions)),
  );
  const servers = dataServers();
  const straight = await Promise.all(
    stations.map(({ id }) =>
      connectTo(servers[bucketOf(id) % servers.length] ?? { name: '', host: '', port: 0 }),
    ),
  );
  const bodies = await Promise.all(
    Array.from({ length: 2 * (TURNS + 1) * STATEMENTS }, (_, at) =>
      invent(FIRST_SEC + at * ROWS * 60, ROWS, 60),
    ),
  );
  const send = (all: mysql.Connection[], first: number, isStraight: boolean) =>
    Promise.all(
      all.map(async (connection, at) => {
        const id = stations[at]?.id ?? NaN;
        for (const body of bodies.slice(first, first + STATEMENTS)) {
          const text = insertStatement(id, body);
          const table = bucketTable('interval_levels', bucketOf(id));
          await connection.query(isStraight ? text.replace('interval_levels', table) : text);
        }
      }),
    );
  try {
    return await compare(
      TURNS,
      (turn) => send(connections, 2 * (turn + 1) * STATEMENTS, false),
      (turn) => send(straight, (2 * (turn + 1) + 1) * STATEMENTS, true),
    );
  } finally {
    for (const connection of [...connections, ...straight]) connection.destroy();
  }
}

/** Posts of one interval, as `inTransaction` stores them, against the same without the gate. */
async function gate(networkId: number) {
  const stations: StationRow[] = [];
  for (let at = 0; at < SENDERS; at += 1) stations.push(await makeStation(networkId, `SMALL-${at}`, 60));
  const bodies = await invent(FIRST_SEC, 2 * (TURNS + 1) * SMALL, 60);
  const post = (first: number, store: (statement: string) => Promise<unknown>) =>
    Promise.all(
      stations.map(async ({ id }) => {
        for (const body of bodies.slice(first, first + SMALL)) await store(insertStatement(id, [body]));
      }),
    );
  return compare(
    TURNS,
    (turn) =>
      post(2 * (turn + 1) * SMALL, (statement) =>
        inTransaction((transaction) => transaction.raw(statement).then(() => undefined)),
      ),
    (turn) =>
      post((2 * (turn + 1) + 1) * SMALL, (statement) =>
        db().transaction((transaction) => transaction.raw(statement).then(() => undefined)),
      ),
  );
}
