import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { closeDb, db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { migrateUp } from '#db/migrateUp';
import { callApi } from '../support/callApi';
import { startServerOfOwn, type ServerOfOwn } from '../support/serverOfOwn';
import { complain, fillInstance } from './fixture';
import { runScript, tablesOf } from './support';

/** The drill of ops/guide.md, “A point in time, by the binary log”: back to the second before a mistake, with all that came after the backup. */
vi.setConfig({ testTimeout: 240_000, hookTimeout: 120_000 });
const root = mkdtempSync(join(tmpdir(), 'bittern-instant-'));
const backups = join(root, 'backups');
const logs = join(root, 'server', 'logs');
let running: ServerOfOwn;

beforeAll(async () => {
  process.env['BITTERN_DATA_DIR'] = join(root, 'data');
  process.env['BITTERN_BACKUP_DIR'] = backups;
  running = await startServerOfOwn(join(root, 'server'), [
    `--log-bin=${logs}`,
    '--binlog-format=ROW',
    '--sync-binlog=1',
    '--server-id=1',
  ]);
  await migrateUp();
});

afterAll(async () => {
  await closeDb();
  await running.server.stop();
  rmSync(root, { recursive: true, force: true });
});

const DAY = '2026-03-02T';
const BANDS = [63, 125, 250, 500, 1000, 2000, 4000, 8000];

async function post(token: string, hour: number): Promise<void> {
  const intervals = Array.from({ length: 60 }, (_, minute) => ({
    start: `${DAY}${String(hour).padStart(2, '0')}:${String(minute).padStart(2, '0')}:00Z`,
    seconds: 60,
    LAeq: 50 + minute / 10,
    levels: BANDS.map((_, band) => 40 + band),
  }));
  const answer = await callApi('POST', '/api/v1/intervals', { token, body: { bands: BANDS, intervals } });
  expect(await answer.json()).toMatchObject({ accepted: 60 });
}

/** The statements of the log from a backup's position up to a second, as the guide says them. */
function replayed({ file, position }: { file: string; position: number }, stopAt: string): string {
  const files = readdirSync(join(root, 'server'))
    .filter((name) => /^logs\.\d+$/.test(name) && name >= file)
    .sort();
  const paths = files.map((name) => join(root, 'server', name));
  const options = ['--database=own', `--start-position=${position}`, `--stop-datetime=${stopAt}`];
  const env = { ...process.env, TZ: 'UTC' };
  const read = spawnSync('mariadb-binlog', [...options, ...paths], { env, maxBuffer: 1e9, encoding: 'utf8' });
  expect(read.stderr).toBe('');
  return read.stdout;
}

function load(sql: string) {
  const socket = join(root, 'server', 'socket');
  const args = ['--no-defaults', `--socket=${socket}`, '--user=root', '--password=test', 'own'];
  return spawnSync('mariadb', args, { input: sql, encoding: 'utf8' });
}

it('brings back every table as it was in the second before the mistake', async () => {
  const { session } = await fillInstance('a drill with five words');
  const stationId = (await db()('stations').first('id')).id as number;
  await db()('stations')
    .where({ id: stationId })
    .update({ band_fraction: 1, first_band_index: -12, last_band_index: 9 });
  const token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
  await post(token, 3);
  const backup = await runScript('ops/backup.sh', [], {});
  expect(backup).toMatchObject({ code: 0 });

  // What people and monitors did afterwards and were answered for.
  await post(token, 4);
  await complain(session, 'After the backup');
  await db()('sessions').update({ last_seen_at: new Date() });
  await post(token, 5);
  const right = await tablesOf('own');
  const stopSec = Math.floor(Date.now() / 1000) + 1;
  await sleep(stopSec * 1000 - Date.now() + 50);
  await db()('interval_levels').delete();
  await db()('complaint_keys').delete();
  await post(token, 6);
  await closeDb();

  await running.asRoot('FLUSH BINARY LOGS');
  const manifest = JSON.parse(
    readFileSync(join(backups, 'data', readdirSync(join(backups, 'data'))[0] ?? '', 'manifest.json'), 'utf8'),
  );
  const sql = replayed(
    manifest.binaryLog,
    new Date(stopSec * 1000).toISOString().slice(0, 19).replace('T', ' '),
  );
  const restored = await runScript('ops/restore.sh', ['latest', '--replace'], {});
  expect(restored).toMatchObject({ code: 0 });

  // The restore ended the sessions, which the log changes: strictly it cannot be replayed.
  expect(load(sql).stderr).toContain("Can't find record in 'sessions'");
  await running.asRoot("SET GLOBAL slave_exec_mode = 'IDEMPOTENT'");
  expect(load(sql)).toMatchObject({ status: 0 });
  await running.asRoot("SET GLOBAL slave_exec_mode = 'STRICT'");

  const back = await tablesOf('own');
  expect(right['interval_levels']).toMatch(/^\d{4} /);
  expect(back['sessions']).toMatch(/^0 /);
  expect({ ...back, sessions: null }).toEqual({ ...right, sessions: null });
});
