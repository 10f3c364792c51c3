import { spawn } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { db } from '#db/client';
import { pool } from '#db/queries/connection';
import { type StationRow } from '#db/queries/stations';
import { insertUser } from '#db/queries/users';
import { WORKER_ARGUMENTS } from '#ops/start/workerArguments';
import type { MadeMonth } from './support/makeMonth';
import { digits, printTable } from './support/measure';
import { fillMonth, FIRST_SEC } from './support/months';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';

/**
 * How long a network’s month takes from asking to its draft, and from there to its issued files, at 8 and at 100 stations of minutes with
 * 31 thirds, and the highest memory of a worker that does nothing else. Targets: drafts in 5 s and 60 s, files in 60 s, under 500 MiB.
 * `SUMMARY_STATIONS=8` asks for one size alone.
 */
const SIZES = (process.env['SUMMARY_STATIONS'] ?? '8,100').split(',').map(Number);
const TABLES = ['interval_levels', 'quarter_hours', 'day_periods'] as const;

await withOwnSchema(async () => {
  const user = { id: randomUUID(), email: 'bench@merrow.example', name: 'Bench' };
  await insertUser({ ...user, passwordHash: '', isAdministrator: false }, pool());
  const filled = await makeStation(await makeNetwork('bench'), 'S000', 60);
  await fillMonth(filled);
  const rows: string[][] = [];
  for (const size of SIZES) {
    const slug = `bench-${size}`;
    const networkId = await makeNetwork(slug);
    for (let at = 0; at < size; at += 1) {
      await copy(filled, await makeStation(networkId, `S${String(at).padStart(3, '0')}`, 60));
    }
    await db()('stations').update({ created_at: new Date((FIRST_SEC - 86_400) * 1000) });
    rows.push(await row(slug, user.id, size));
  }
  printTable(['stations', 'drafted s', 'highest MiB', 'issued s', 'highest MiB'], rows);
});

async function row(slug: string, userId: string, size: number): Promise<string[]> {
  const made = await makeMonth(slug, userId);
  if (made.stations !== size) throw new Error(`${made.stations} stations in the month of ${size}.`);
  const figures = [made.draftedMs / 1000, made.draftedMib, made.issuedMs / 1000, made.issuedMib];
  return [String(size), ...figures.map(digits)];
}

/** Makes the month in a process with a worker’s arguments, which has filled nothing itself. */
async function makeMonth(slug: string, userId: string): Promise<MadeMonth> {
  const dataDir = await mkdtemp(join(tmpdir(), 'bittern-bench-'));
  try {
    const command = [...WORKER_ARGUMENTS, 'ops/bench/support/makeMonth.ts', slug, userId];
    const worker = spawn(process.execPath, command, {
      stdio: ['ignore', 'pipe', 'inherit'],
      env: { ...process.env, BITTERN_DATA_DIR: dataDir },
    });
    let printed = '';
    worker.stdout.on('data', (text: Buffer) => (printed += text.toString()));
    await once(worker, 'exit');
    return JSON.parse(printed) as MadeMonth;
  } finally {
    await rm(dataDir, { recursive: true, force: true });
  }
}

/** Gives a station the rows of another one. */
async function copy(from: StationRow, to: StationRow): Promise<void> {
  for (const table of TABLES) {
    const [columns] = (await db().raw(`SHOW COLUMNS FROM ${table}`)) as [{ Field: string }[]];
    const names = columns.map(({ Field }) => Field);
    const cells = names.map((name) => (name === 'station_id' ? String(to.id) : name));
    await db().raw(
      `INSERT INTO ${table} (${names.join(', ')}) SELECT ${cells.join(', ')} FROM ${table} WHERE station_id = ?`,
      [from.id],
    );
  }
}
