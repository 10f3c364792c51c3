import { readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { connect as connectTls, type TLSSocket } from 'node:tls';
import mysql from 'mysql2/promise';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { connectTo, dataServers, onEach } from '#db/sharding/dataServers';
import { askRoot, databaseDirectory } from '#ops/cluster/databases';
import { certificateOf, dataPort, headPort, nodePorts } from '#ops/cluster/layout';
import { stopProcess } from '#ops/cluster/processes';
import { startDatabases } from '#ops/cluster/programs';
import { makeStation, makeNetwork } from '#ops/bench/support/station';
import { useFreshSchema } from '../integration/support/freshSchema';
import { testCluster } from './support/cluster';

useFreshSchema();
afterAll(closeDb);
let networkId: number;
beforeAll(async () => {
  networkId = await makeNetwork();
});
const layout = testCluster();
const TLS = /^TLSv1\.[23]$/;
const STATUS = "SHOW STATUS LIKE 'Ssl_version'";

const refusal = (port: number) =>
  mysql.createConnection({ host: '127.0.0.1', port, user: 'bittern', password: layout.password }).then(
    async (connection) => {
      await connection.end();
      return null;
    },
    (error: { code?: string }) => error.code,
  );

/** The certificate that whoever listens shows, having been found good. */
function shownBy(port: number, ca: string): Promise<string> {
  return new Promise((resolve, reject) => {
    const socket: TLSSocket = connectTls({ host: '127.0.0.1', port, ca }, () => {
      resolve(socket.getPeerX509Certificate()?.subject ?? '');
      socket.destroy();
    });
    socket.once('error', reject);
  });
}

test('Bittern reaches head and data servers by TLS, and is refused without', async () => {
  const [[ofHead]] = await db().raw(STATUS);
  expect(ofHead.Value).toMatch(TLS);
  for (const server of dataServers()) {
    const connection = await connectTo(server);
    const [[ofData]] = await connection.query<mysql.RowDataPacket[]>(STATUS);
    await connection.end();
    expect(ofData?.['Value']).toMatch(TLS);
  }
  expect(await refusal(headPort(layout))).toBe('ER_ACCESS_DENIED_ERROR');
  expect(await refusal(dataPort(layout, 1))).toBe('ER_ACCESS_DENIED_ERROR');
});

test('the head’s links to data servers are encrypted: their account is taken in no other way', async () => {
  const station = await makeStation(networkId, 'TLS-1', 60);
  expect(await db()('interval_levels').where({ station_id: station.id }).first()).toBeUndefined();
  const kinds = await onEach(dataServers(), async (connection) => {
    const [rows] = await connection.query<mysql.RowDataPacket[]>(
      "SELECT ssl_type FROM mysql.user WHERE user = 'bittern'",
    );
    return rows.map((row) => String(row['ssl_type']));
  });
  expect(kinds).toEqual(dataServers().map(() => ['ANY']));
});

test('a node that has lost its data gets it from another, encrypted; the group speaks TLS', async () => {
  const made = certificateOf(layout);
  if (!made) throw new Error('This cluster has no certificate.');
  const log = join(layout.directory, 'log', 'head3.log');
  await stopProcess(layout, 'head3');
  const before = readFileSync(log, 'utf8').length;
  rmSync(join(databaseDirectory(layout, 'head3'), 'data'), { recursive: true });
  await startDatabases(layout);

  const [found] = await askRoot(
    layout,
    'head3',
    `SELECT COUNT(*) AS count FROM ${process.env['BITTERN_DB_NAME']}.networks WHERE id = ${networkId}`,
  );
  expect(found?.['count']).toBe(1);
  const told = readFileSync(log, 'utf8').slice(before);
  expect(told).toMatch(/Using stunnel for SSL encryption.*VERIFY_CA/);
  // Not the one that all write to: who gives takes no statements meanwhile.
  expect(told).toMatch(
    /Member .* \(head3\) requested state transfer from 'head2,'\. Selected .* \(head2\)\(SYNCED\)/,
  );
  const ca = readFileSync(made.certificate, 'utf8');
  for (const number of [1, 2, 3])
    expect(await shownBy(nodePorts(layout, number).group, ca)).toBe('CN=cluster');
});
