import { readdirSync } from 'node:fs';
import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import type { Knex } from 'knex';
import { config } from '#lib/config/index';
import { db } from './client';
import { withSchemaLock } from './schemaLock';
import { shardTables } from './sharding/shardTables';

const DIRECTORY = 'db/migrations';
const RECORD = 'schema_migrations';
/** What a statement says that has been carried out already: a table, column, key, constraint or trigger is there, or gone. */
const ALREADY_DONE = new Set([1050, 1051, 1054, 1060, 1061, 1091, 1359, 1826]);

/** The database holds what this Bittern knows nothing of. */
export class NewerSchemaError extends Error {
  constructor(unknown: readonly string[]) {
    super(
      `The database ${config().database.name} belongs to a newer Bittern (${unknown.join(', ')} is unknown to this one). ` +
        'Nothing was changed. Start the newer Bittern, or restore a backup that this one made; there is no way down.',
    );
    this.name = 'NewerSchemaError';
  }
}

/** How the schema stands against this Bittern. */
export interface SchemaState {
  /** Migrations that are not applied, in order. */
  pending: string[];
  /** Applied ones that this Bittern does not have. */
  unknown: string[];
}

/** Compares the migrations that were applied with those that there are. */
export async function schemaState(): Promise<SchemaState> {
  const known = readdirSync(DIRECTORY)
    .filter((name) => name.endsWith('.mjs'))
    .sort();
  const hasRecord = await db().schema.hasTable(RECORD);
  const applied: string[] = hasRecord ? await db()(RECORD).orderBy('id').pluck('name') : [];
  return {
    pending: known.filter((name) => !applied.includes(name)),
    unknown: applied.filter((name) => !known.includes(name)),
  };
}

/**
 * Applies what is pending, one process at a time. A migration whose process was killed before it was noted is gone on with: the database
 * carries out each statement wholly or not at all, and what says that it was carried out before is passed over.
 * @param only these, where given, in this order; by default all that are pending.
 * @returns the names of what was applied.
 * @throws {NewerSchemaError} before anything is changed.
 */
export async function migrateUp(only?: readonly string[]): Promise<string[]> {
  return withSchemaLock(async () => {
    const state = await schemaState();
    if (state.unknown.length > 0) throw new NewerSchemaError(state.unknown);
    const pending = only?.filter((name) => state.pending.includes(name)) ?? state.pending;
    await apply(pending, only);
    if (only === undefined) await shardTables();
    return pending;
  });
}

async function apply(pending: readonly string[], only: readonly string[] | undefined): Promise<void> {
  if (pending.length === 0) return;
  if (await wasBrokenOff()) {
    await db().migrate.forceFreeMigrationsLock();
    await applyBrokenOff(pending[0] ?? '');
  }
  if (only === undefined) await db().migrate.latest();
  else
    for (const name of (await schemaState()).pending.filter((one) => only.includes(one)))
      await applyOne(name);
}

/** Whether a run that held Knex's own mark ended without taking it away; nobody else runs, because we hold the lock. */
async function wasBrokenOff(): Promise<boolean> {
  const table = `${RECORD}_lock`;
  if (!(await db().schema.hasTable(table))) return false;
  const row: { is_locked: number } | undefined = await db()(table).first('is_locked');
  return row?.is_locked === 1;
}

function applyOne(name: string): Promise<unknown> {
  const chosen: Knex.MigratorConfig & { name: string } = { name };
  return db().migrate.up(chosen);
}

interface Migration {
  up(conn: Knex): Promise<unknown>;
}

/** Carries out what is left of a migration, and notes it in the same transaction. */
async function applyBrokenOff(name: string): Promise<void> {
  const { up } = (await import(pathToFileURL(resolve(DIRECTORY, name)).href)) as Migration;
  await db().transaction(async (transaction) => {
    await up(forgiving(transaction));
    const last = await transaction(RECORD).max<{ batch: number | null }[]>({ batch: 'batch' });
    const batch = (last[0]?.batch ?? 0) + 1;
    await transaction(RECORD).insert({ name, batch, migration_time: new Date() });
  });
}

/** A connection on which statements that were carried out before do not fail. */
function forgiving(conn: Knex): Knex {
  const raw = async (sql: string) => {
    try {
      return await conn.raw(sql);
    } catch (error) {
      if (!ALREADY_DONE.has((error as { errno?: number }).errno ?? 0)) throw error;
      return undefined;
    }
  };
  return new Proxy(conn, {
    get: (target, key, receiver) => (key === 'raw' ? raw : (Reflect.get(target, key, receiver) as unknown)),
  });
}
