import { advanceImports } from '#ingest/imports/advance';

/** Checks, stores or undoes files that people brought. @returns how much it did. */
export function importFiles(): Promise<number> {
  return advanceImports();
}
