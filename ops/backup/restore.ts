import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { closeDb } from '#db/client';
import { migrateUp } from '#db/migrateUp';
import { findAuditBreak } from '#db/queries/audit';
import type { Config } from '#lib/config/config';
import { config } from '#lib/config/index';
import { ensureDatabase, OwnDatabase } from '#ops/start/ownDatabase';
import { ensureSecrets } from '#ops/start/secrets';
import {
  countWaitingMessages,
  endSessions,
  findFileTroubles,
  opensPersonalData,
  removeStrayKeys,
} from './afterLoad';
import { makeRoom } from './emptyInstance';
import { Ending, EXIT, exitCodeOf } from './ending';
import { unpack } from './keptFiles';
import { digestDatabase, loadStatements, passphraseOf, requireSameRows } from './loadSet';
import { type Manifest, readVerified } from './manifest';
import { restoreRequest, type RestoreRequest } from './restoreArguments';
import { readSealed } from './sealedFile';
import { connect, takeTurn } from './server';

/** Restores a backup into the instance that the settings name. See `ops/guide.md`. */
async function restore(): Promise<void> {
  ensureSecrets(process.env['BITTERN_DATA_DIR'] || '.bittern', process.env);
  const settings = config();
  const request = await restoreRequest(process.argv.slice(2), settings.backup.dir);
  const { passphraseFile } = settings.backup;
  const data = await readOf('data', request.data, passphraseFile);
  const keys = request.keys === null ? null : await readOf('keys', request.keys, passphraseFile);
  for (const manifest of [data, keys]) requireKnownMigration(manifest);
  console.log(`${request.data}: ${data.tables.length} tables of ${data.madeAt}, as they were written.`);
  console.log(
    keys ? `${request.keys}: keys of ${keys.madeAt}.` : 'No keys: residents’ data will stay closed.',
  );
  if (request.onlyChecks) return;
  const stop = await reachDatabase(settings);
  try {
    await load(settings, request, data, keys);
    await afterwards(settings, keys !== null);
  } finally {
    await closeDb();
    await stop();
  }
}

async function readOf(kind: Manifest['kind'], directory: string, passphraseFile: string | null) {
  const manifest = await readVerified(directory, passphraseFile);
  if (manifest.kind === kind) return manifest;
  throw new Ending(EXIT.usage, `${directory} is a set of ${manifest.kind}, not of ${kind}.`);
}

/** A backup of a younger Bittern would be left half understood. */
function requireKnownMigration(manifest: Manifest | null): void {
  if (manifest === null || existsSync(join('db/migrations', manifest.migration))) return;
  throw new Ending(
    EXIT.usage,
    `The backup is of a newer Bittern, which had the migration ${manifest.migration}.`,
  );
}

/** Starts a MariaDB of our own where the settings want one and it does not run. Answers how to stop it again. */
async function reachDatabase(settings: Config): Promise<() => Promise<void>> {
  const isUp = await ensureDatabase(settings).then(
    () => true,
    (error: { code?: string }) => {
      if (!settings.database.isOwn || error.code !== 'ECONNREFUSED') throw error;
      return false;
    },
  );
  if (isUp) return async () => undefined;
  const own = new OwnDatabase(settings);
  await own.start();
  await ensureDatabase(settings);
  return () => own.stop();
}

async function load(
  settings: Config,
  request: RestoreRequest,
  data: Manifest,
  keys: Manifest | null,
): Promise<void> {
  const connection = await connect(settings);
  try {
    await takeTurn(connection, settings.database.name);
    await makeRoom(connection, settings, request.mayReplace);
    await loadStatements(settings, request.data, data);
    if (keys && request.keys) await loadStatements(settings, request.keys, keys);
    const found = await digestDatabase(settings);
    requireSameRows(data, found);
    if (keys) requireSameRows(keys, found);
    const rows = [...data.tables, ...(keys?.tables ?? [])].reduce((sum, table) => sum + table.rows, 0);
    console.log(`Restored ${rows} rows into ${settings.database.name}; every table is as it was.`);
    await readSealed(join(request.data, 'files.tar.gz'), passphraseOf(settings, data), (archive) =>
      unpack(archive, settings.dataDir),
    );
  } finally {
    await connection.end();
  }
}

async function afterwards(settings: Config, hasKeys: boolean): Promise<void> {
  const migrations = await migrateUp();
  console.log(`Applied ${migrations.length} migrations.`);
  if (hasKeys)
    console.log(
      `Removed ${await removeStrayKeys()} keys and contacts of complaints that the data do not hold.`,
    );
  console.log(`Ended ${await endSessions()} sessions: everybody signs in again.`);
  const waiting = await countWaitingMessages();
  if (waiting > 0)
    console.log(
      `${waiting} messages wait and go out when the worker starts; some may have been sent already.`,
    );
  const opens = await opensPersonalData();
  const troubles = await findFileTroubles(settings.dataDir);
  const broken = await findAuditBreak();
  if (opens === false)
    troubles.push('BITTERN_PERSONAL_DATA_KEY is not the one that residents’ data were written with');
  if (broken !== null) troubles.push(`the audit trail is broken at ${broken}`);
  if (troubles.length > 0) throw new Ending(EXIT.failed, `Restored, but:\n  ${troubles.join('\n  ')}`);
  console.log('All files that rows name are there, and the audit trail holds.');
}

process.exitCode = await exitCodeOf(restore);
