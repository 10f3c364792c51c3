import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb } from '#db/client';
import { dataServers, onEach } from '#db/sharding/dataServers';
import { dropShards } from '#db/sharding/dropShards';
import { bucketOf, BUCKETS, KINDS } from '#db/sharding/kinds';
import { config } from '#lib/config/index';
import { certificateOf, dataPort, headPort, nodePorts } from '#ops/cluster/layout';
import { moveBucket, placesOfBuckets } from '#ops/cluster/moveBucket';
import { fillInstance } from '../integration/backup/fixture';
import { askServer, runScript, tablesOf } from '../integration/backup/support';
import { useFreshSchema } from '../integration/support/freshSchema';
import { testCluster } from './support/cluster';

/** Backups of each part by itself, as the guide tells them: data servers first, then the head without their rows. */
const layout = testCluster();
const root = mkdtempSync(join(tmpdir(), 'bittern-parts-backup-'));
const STANDING_BY = 3;
process.env['BITTERN_DATA_DIR'] = join(root, 'files');
useFreshSchema();

beforeAll(async () => {
  await fillInstance('a drill with five words');
});

afterAll(async () => {
  await closeDb();
  rmSync(root, { recursive: true, force: true });
});

/** What the account needs to reach a server with a program of MariaDB's own. */
function reaching(port: number): string[] {
  const made = certificateOf(layout);
  return [
    '--no-defaults',
    '--host=127.0.0.1',
    `--port=${port}`,
    '--user=bittern',
    `--password=${layout.password}`,
    ...(made ? [`--ssl-ca=${made.certificate}`, '--ssl-verify-server-cert'] : []),
  ];
}

function dump(port: number, name: string, more: string[] = []): void {
  const text = execFileSync(
    'mariadb-dump',
    [...reaching(port), '--single-transaction', '--hex-blob', ...more, name],
    {
      maxBuffer: 2 ** 30,
    },
  );
  writeFileSync(join(root, `${port}.sql`), text);
}

function bringBack(port: number, name: string): void {
  execFileSync('mariadb', [...reaching(port), name], { input: readFileSync(join(root, `${port}.sql`)) });
}

test.skipIf(process.env['CLUSTER'] !== 'whole')(
  'every part is brought back from its own dump: rows, and which server has which bucket',
  async () => {
    const { name } = config().database;
    const [station] = await askServer('SELECT id FROM stations', name);
    const bucket = bucketOf(Number(station?.['id']));
    const from = (await placesOfBuckets())[bucket];
    const to = dataServers().find((server) => server.name !== from?.name);
    if (!to) throw new Error('There is one data server alone.');
    await moveBucket(bucket, to);
    const before = await tablesOf(name);
    expect(before['interval_levels']).toMatch(/^1440 /);
    const places = await placesOfBuckets();

    const dataPorts = dataServers().map((_, at) => dataPort(layout, at + 1));
    for (const port of dataPorts) dump(port, name);
    const withoutRows = KINDS.map((kind) => `--ignore-table-data=${name}.${kind}`);
    dump(nodePorts(layout, STANDING_BY).sql, name, withoutRows);
    await dropShards();
    await closeDb();
    await askServer(`DROP DATABASE ${name}`);

    const create = `CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`;
    for (const port of [...dataPorts, headPort(layout)])
      execFileSync('mariadb', [...reaching(port), `--execute=${create}`]);
    for (const port of dataPorts) bringBack(port, name);
    expect(await runScript('ops/cluster.sh', ['link'], {})).toEqual({ code: 0, said: '' });
    bringBack(nodePorts(layout, STANDING_BY).sql, name);

    expect(await placesOfBuckets()).toEqual(places);
    expect(await tablesOf(name)).toEqual(before);
    const tables = await onEach(dataServers(), async (connection) => {
      const [rows] = await connection.query('SHOW TABLES');
      return (rows as unknown[]).length;
    });
    expect(tables.reduce((sum, count) => sum + count, 0)).toBe(BUCKETS * KINDS.length);
  },
  240_000,
);
