import { mkdtempSync } from 'node:fs';
import { readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { fillInstance } from '../integration/backup/fixture';
import { askServer, freshName, runScript, tablesOf } from '../integration/backup/support';
import { useFreshSchema } from '../integration/support/freshSchema';

/** From a cluster into one server; from a cluster into a cluster is `integration/backup/drill`, which runs here in the whole form. */
const root = mkdtempSync(join(tmpdir(), 'bittern-cluster-backup-'));
const target = {
  BITTERN_DB_NAME: freshName(),
  BITTERN_DATA_DIR: join(root, 'target'),
  BITTERN_DATA_SERVERS: '',
  BITTERN_BACKUP_DIR: join(root, 'backups'),
};
process.env['BITTERN_DATA_DIR'] = join(root, 'source');

useFreshSchema();

beforeAll(async () => {
  await fillInstance('a drill with five words');
});

afterAll(async () => {
  await askServer(`DROP DATABASE IF EXISTS ${target.BITTERN_DB_NAME}`);
  await rm(root, { recursive: true, force: true });
});

test.skipIf(process.env['CLUSTER'] !== 'whole')(
  'a backup of a cluster is restored into one server, with the rows of every data server',
  async () => {
    const before = await tablesOf(process.env['BITTERN_DB_NAME'] ?? '');
    expect(before['interval_levels']).toMatch(/^1440 /);
    const ok = { code: 0, said: expect.any(String) as string };
    expect(await runScript('ops/backup.sh', [], { BITTERN_BACKUP_DIR: target.BITTERN_BACKUP_DIR })).toEqual(
      ok,
    );
    expect(await runScript('ops/restore.sh', ['latest'], target)).toEqual(ok);
    for (const name of ['sessions', 'audit_log', 'audit_head']) delete before[name];
    expect(await tablesOf(target.BITTERN_DB_NAME)).toMatchObject(before);
    const engines = await askServer(
      `SELECT DISTINCT engine FROM information_schema.tables WHERE table_schema = '${target.BITTERN_DB_NAME}'`,
    );
    expect(engines).toEqual([{ engine: 'InnoDB' }]);
    const [row] = await askServer('SHOW CREATE TABLE interval_levels', target.BITTERN_DB_NAME);
    const local = /^CREATE TABLE `interval_levels`[\s\S]*?;$/m.exec(
      await readFile('db/schema.sql', 'utf8'),
    )?.[0];
    expect(String(row?.['Create Table']).split(') ENGINE')[0]).toBe(local?.split(') ENGINE')[0]);
  },
);
