import { randomBytes } from 'node:crypto';
import { cpus, loadavg } from 'node:os';
import { closeDb, db } from '#db/client';
import { asOwner } from './asOwner';

/**
 * Runs `work` with a migrated database of its own as the process's, and drops it whatever happens. Unless told not
 * to, prints on what machine, and how busy it was before and after.
 */
export async function withOwnSchema(work: () => Promise<void>, { isTold = true } = {}): Promise<void> {
  const name = `bittern_bench_${randomBytes(6).toString('hex')}`;
  process.env['BITTERN_DB_NAME'] = name;
  process.env['BITTERN_LOG_LEVEL'] ??= 'silent';
  await asOwner(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`);
  try {
    await db().migrate.latest();
    if (isTold) printMachine();
    await work();
    if (isTold) printLoad();
  } finally {
    await closeDb();
    await asOwner(`DROP DATABASE IF EXISTS ${name}`);
  }
}

function printMachine(): void {
  const [cpu] = cpus();
  console.log(
    `${new Date().toISOString().slice(0, 10)}, ${cpus().length} × ${cpu?.model}, Node ${process.version}`,
  );
  printLoad();
}

function printLoad(): void {
  console.log(`Load average of the last minute: ${loadavg()[0]?.toFixed(1)}\n`);
}
