import { rmSync, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll } from 'vitest';
import { db } from '#db/client';
import { findWorkingImport } from '#db/queries/imports';
import type { Import } from '#lib/contracts/imports';
import { advanceImports } from '#ingest/imports/advance';
import { callApi } from '../support/callApi';

/** Gives the test file a data directory of its own. Call it before anything reads the settings. */
export function useDataDirectory(): void {
  const directory = mkdtempSync(join(tmpdir(), 'bittern-test-imports-'));
  process.env['BITTERN_DATA_DIR'] = directory;
  process.env['BITTERN_IMPORT_MAX_MIB'] = '1';
  afterAll(() => rmSync(directory, { recursive: true, force: true }));
}

/** Uploads, reads and acts on imports of a network as a person. */
export function importsOf(network: string, session: () => string) {
  const base = `/api/v1/networks/${network}/imports`;
  const importIn = async (answer: Response, status: number): Promise<Import> => {
    if (answer.status !== status) throw new Error(`${answer.status}: ${await answer.text()}`);
    return ((await answer.json()) as { import: Import }).import;
  };
  const call = (method: string, path: string, body?: unknown) =>
    callApi(method, `${base}${path}`, { session: session(), body });
  return {
    call,
    upload: async (station: string, text: string) =>
      importIn(
        await callApi('POST', `${base}?station=${station}&name=card.csv`, {
          session: session(),
          headers: { 'content-type': 'text/csv' },
          body: text,
        }),
        201,
      ),
    read: async (id: number) => importIn(await call('GET', `/${id}`), 200),
    map: async (id: number, mapping: Record<string, unknown>) =>
      importIn(await call('PUT', `/${id}/mapping`, mapping), 200),
    act: async (id: number, act: string, reason?: string) =>
      importIn(await call('POST', `/${id}/acts`, { act, reason }), 202),
  };
}

/** Lets the worker go on until nothing waits. */
export async function work(): Promise<void> {
  while (await findWorkingImport()) await advanceImports();
}

/** The stored rows of a station without what says when and how they came. */
export async function storedRows(stationId: number): Promise<Record<string, unknown>[]> {
  const rows: Record<string, unknown>[] = await db()('interval_levels')
    .where({ station_id: stationId })
    .orderBy('starts_at')
    .select('*');
  return rows.map(({ station_id, received_at, import_id, ...row }) => {
    void [station_id, received_at, import_id];
    return row;
  });
}
