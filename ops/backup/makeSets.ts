import { mkdir, rename, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { localDefinitions } from '#db/sharding/localDefinitions';
import type { Config } from '#lib/config/config';
import { startDump } from './databaseTools';
import { APART, DumpReader, linesOf, type TableDigest } from './dumpReader';
import { keptFolders, startArchive } from './keptFiles';
import { type Manifest, writeManifest } from './manifest';
import { setName, type SetKind, unfinishedName } from './rotate';
import { type FileFacts, writeSealed } from './sealedFile';
import { connect, valueOf } from './server';
import type { Tool } from './tool';

/** What a backup made. */
export interface MadeSets {
  name: string;
  bytes: number;
  tables: TableDigest[];
}

/**
 * Makes a set of the data and one of the keys, both of one moment, under unfinished names first. The files are taken after the
 * database, so that what its rows name is there.
 * @throws when anything fails; then neither set is there.
 */
export async function makeSets(settings: Config, now: Date): Promise<MadeSets> {
  const { dir, passphraseFile } = settings.backup;
  const name = setName(now);
  const places = {
    data: join(dir, 'data', unfinishedName(name)),
    keys: join(dir, 'keys', unfinishedName(name)),
  };
  try {
    await mkdir(places.data, { mode: 0o700 });
    await mkdir(places.keys, { mode: 0o700 });
    const about = await aboutDatabase(settings);
    const { reader, data, keys } = await writeDatabase(settings, about.hasBinaryLog, places);
    const folders = await keptFolders(settings.dataDir, dir);
    const archive = startArchive(settings.dataDir, folders);
    const files = await writeSealed(
      wholeOf(archive),
      join(places.data, 'files.tar.gz'),
      'files.tar.gz',
      passphraseFile,
    );
    const tables = reader.digests();
    const common = {
      format: 1 as const,
      madeAt: now.toISOString(),
      server: about.server,
      migration: about.migration,
      isEncrypted: passphraseFile !== null,
      binaryLog: reader.binaryLog,
    };
    const manifestOf = (kind: SetKind, held: FileFacts[]): Manifest => ({
      ...common,
      kind,
      files: held,
      tables: tables.filter((table) => APART.has(table.name) === (kind === 'keys')),
    });
    await writeManifest(places.data, manifestOf('data', [data, files]), passphraseFile);
    await writeManifest(places.keys, manifestOf('keys', [keys]), passphraseFile);
    await rename(places.keys, join(dir, 'keys', name));
    await rename(places.data, join(dir, 'data', name));
    return { name, bytes: data.bytes + files.bytes + keys.bytes, tables };
  } catch (error) {
    for (const place of Object.values(places)) await rm(place, { recursive: true, force: true });
    await rm(join(dir, 'keys', name), { recursive: true, force: true });
    throw error;
  }
}

async function writeDatabase(
  settings: Config,
  hasBinaryLog: boolean,
  places: Record<SetKind, string>,
): Promise<{ reader: DumpReader; data: FileFacts; keys: FileFacts }> {
  const { passphraseFile } = settings.backup;
  const reader = new DumpReader(await localDefinitions());
  const dump = startDump(settings, hasBinaryLog);
  const file = 'database.sql.gz';
  const data = await writeSealed(dataOf(dump, reader), join(places.data, file), file, passphraseFile);
  const apart = Readable.from([Buffer.from(reader.apart, 'latin1')]);
  const keys = await writeSealed(apart, join(places.keys, 'keys.sql.gz'), 'keys.sql.gz', passphraseFile);
  return { reader, data, keys };
}

async function* dataOf(dump: Tool, reader: DumpReader): AsyncGenerator<Buffer> {
  for await (const lines of linesOf(dump.output)) yield Buffer.from(reader.take(lines), 'latin1');
  await dump.ended;
}

async function* wholeOf(tool: Tool): AsyncGenerator<Uint8Array> {
  yield* tool.output as AsyncIterable<Uint8Array>;
  await tool.ended;
}

async function aboutDatabase(settings: Config) {
  const connection = await connect(settings);
  try {
    return {
      server: String(await valueOf(connection, 'SELECT VERSION()')),
      hasBinaryLog: Number(await valueOf(connection, 'SELECT @@log_bin')) === 1,
      migration: String(
        await valueOf(connection, 'SELECT name FROM schema_migrations ORDER BY id DESC LIMIT 1'),
      ),
    };
  } finally {
    await connection.end();
  }
}
