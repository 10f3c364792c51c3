import { readdirSync } from 'node:fs';
import { config } from '#lib/config/index';
import { db } from './client';
import { withSchemaLock } from './schemaLock';

const DIRECTORY = 'db/migrations';
const RECORD = 'schema_migrations';
/** What a statement says that has been carried out already: a table, column, key, constraint or trigger is there, or gone. */
const ALREADY_DONE = new Set([1050, 1051, 1060, 1061, 1091, 1359, 1826]);

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
 * Applies what is pending, one process at a time. A migration whose statement was carried out before its process was killed, and before
 * that was noted, is noted now: each is one statement, which the database carries out wholly or not at all.
 * @returns the names of what was applied.
 * @throws {NewerSchemaError} before anything is changed.
 */
export async function migrateUp(): Promise<string[]> {
  return withSchemaLock(async () => {
    const { pending, unknown } = await schemaState();
    if (unknown.length > 0) throw new NewerSchemaError(unknown);
    if (pending.length === 0) return [];
    if (await wasBrokenOff()) {
      await db().migrate.forceFreeMigrationsLock();
      await applyBrokenOff(pending[0] ?? '');
    }
    await db().migrate.latest();
    return pending;
  });
}

/** Whether a run that held Knex's own mark ended without taking it away; nobody else runs, because we hold the lock. */
async function wasBrokenOff(): Promise<boolean> {
  const table = `${RECORD}_lock`;
  if (!(await db().schema.hasTable(table))) return false;
  const row: { is_locked: number } | undefined = await db()(table).first('is_locked');
  return row?.is_locked === 1;
}

async function applyBrokenOff(name: string): Promise<void> {
  try {
    await db().migrate.up();
  } catch (error) {
    if (!ALREADY_DONE.has((error as { errno?: number }).errno ?? 0)) throw error;
    const last = await db()(RECORD).max<{ batch: number | null }[]>({ batch: 'batch' });
    await db()(RECORD).insert({ name, batch: (last[0]?.batch ?? 0) + 1, migration_time: new Date() });
  }
}
