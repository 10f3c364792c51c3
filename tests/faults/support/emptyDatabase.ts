import { randomBytes } from 'node:crypto';
import { afterEach, beforeEach } from 'vitest';
import { closeDb } from '#db/client';
import { asOwner } from '#ops/bench/support/asOwner';

/** Gives each test of a file an empty database, which `db()` and child processes with our environment use. */
export function useEmptyDatabase(): void {
  // Settings are read once.
  const name = `bittern_fault_${randomBytes(6).toString('hex')}`;

  beforeEach(async () => {
    process.env['BITTERN_DB_NAME'] = name;
    await asOwner(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`);
  });

  afterEach(async () => {
    await closeDb();
    await asOwner(`DROP DATABASE IF EXISTS ${name}`);
  });
}
