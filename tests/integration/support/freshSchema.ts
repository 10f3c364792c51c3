import { randomBytes } from 'node:crypto';
import { afterAll, beforeAll } from 'vitest';
import { closeDb, db } from '#db/client';
import { dropShards } from '#db/sharding/dropShards';
import { shardTables } from '#db/sharding/shardTables';
import { asOwner } from '#ops/bench/support/asOwner';

/** Gives the test file a migrated database of its own, dropped when the file is done. */
export function useFreshSchema(): void {
  const name = `bittern_test_${randomBytes(6).toString('hex')}`;

  beforeAll(async () => {
    process.env['BITTERN_DB_NAME'] = name;
    await asOwner(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`);
    await db().migrate.latest();
    await shardTables();
  });

  afterAll(async () => {
    await dropShards();
    await closeDb();
    await asOwner(`DROP DATABASE IF EXISTS ${name}`);
  });
}
