import { join } from 'node:path';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Config } from '#lib/config/config';
import { startDump, startLoad } from './databaseTools';
import { DumpReader, linesOf, type TableDigest } from './dumpReader';
import { Ending, EXIT } from './ending';
import type { Manifest } from './manifest';
import { readSealed } from './sealedFile';

/** Carries out the statements of a set's file in the database of the settings. */
export async function loadStatements(settings: Config, directory: string, manifest: Manifest): Promise<void> {
  const name = manifest.kind === 'data' ? 'database.sql.gz' : 'keys.sql.gz';
  await readSealed(join(directory, name), passphraseOf(settings, manifest), async (plain: Readable) => {
    const client = startLoad(settings);
    client.output.resume();
    // The client's own words say more than that it would not take the rest.
    const [own, flow] = await Promise.allSettled([client.ended, pipeline(plain, client.input)]);
    if (own.status === 'rejected') throw own.reason;
    if (flow.status === 'rejected') throw flow.reason;
  });
}

/** The passphrase's file, where a set is encrypted. */
export function passphraseOf({ backup }: Config, { isEncrypted }: Manifest): string | null {
  return isEncrypted ? backup.passphraseFile : null;
}

/** Counts and digests the rows of every table as they stand in the database. */
export async function digestDatabase(settings: Config): Promise<TableDigest[]> {
  const reader = new DumpReader();
  const dump = startDump(settings);
  for await (const lines of linesOf(dump.output)) reader.take(lines);
  await dump.ended;
  return reader.digests();
}

/** @throws {Ending} naming the tables of a manifest that are not in the database as they were. */
export function requireSameRows(manifest: Manifest, found: TableDigest[]): void {
  const digests = new Map(found.map((table) => [table.name, table.sha256]));
  const differ = manifest.tables.filter(({ name, sha256 }) => digests.get(name) !== sha256);
  if (differ.length === 0) return;
  const names = differ.map(({ name }) => name).join(', ');
  throw new Ending(EXIT.failed, `Restored, but these tables are not as they were: ${names}.`);
}
