import { setTimeout as sleep } from 'node:timers/promises';
import { migrateUp, NewerSchemaError, schemaState } from './migrateUp';

const POLL_MS = 2_000;

export interface SchemaWait {
  /** Applies what is pending; else waits until somebody else has. */
  mayMigrate: boolean;
  /** Told once of each: the database is away, or migrations are pending. */
  tell(what: string): void;
}

/**
 * Waits until the database is there and has the schema of this Bittern, for as long as that takes.
 * @throws {NewerSchemaError} when it belongs to a newer one; and what a migration fails with.
 */
export async function untilSchemaIsCurrent({ mayMigrate, tell }: SchemaWait): Promise<void> {
  let told = '';
  const tellOnce = (what: string) => {
    if (what !== told) tell(what);
    told = what;
  };
  for (;;) {
    const state = await schemaState().catch((error: unknown) => {
      tellOnce(`the database does not answer (${(error as { code?: string }).code ?? String(error)})`);
      return null;
    });
    if (state && state.unknown.length > 0) throw new NewerSchemaError(state.unknown);
    if (state && state.pending.length === 0) return;
    if (state && mayMigrate) {
      tellOnce(`applying ${state.pending.length} migrations`);
      await migrateUp();
      continue;
    }
    if (state)
      tellOnce(`${state.pending.length} migrations are pending; apply them by npx tsx db/migrate.ts`);
    await sleep(POLL_MS);
  }
}
