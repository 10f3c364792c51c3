import { existsSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { join, relative, resolve } from 'node:path';
import { Readable } from 'node:stream';
import { parseArgs } from 'node:util';
import { closeDb } from '#db/client';
import { SettingsError, type Config } from '#lib/config/config';
import { config } from '#lib/config/index';
import { Ending, EXIT, exitCodeOf } from './ending';
import { makeSets } from './makeSets';
import { removeUnfinished, rotate } from './rotate';
import { writeSealed } from './sealedFile';
import { connect, takeTurn } from './server';

/** Backs up the database and the files while Bittern runs, and removes what is older than the settings say. See `ops/guide.md`. */
async function backUp(): Promise<void> {
  const secretsTo = argumentsGiven();
  const settings = config();
  const { dir, keepDays, keysKeepDays, passphraseFile } = settings.backup;
  requirePassphrase(passphraseFile);
  if (secretsTo !== null) requirePlaceForSecrets(settings.backup, secretsTo);
  const connection = await connect(settings);
  try {
    await takeTurn(connection, settings.database.name);
    await removeUnfinished(dir);
    // Whether or not this backup succeeds: an erased person must not be readable for longer than was promised.
    const now = new Date();
    const oldKeys = await rotate(dir, 'keys', { days: keysKeepDays, atLeast: 0, now });
    const made = await makeSets(settings, now);
    const oldData = await rotate(dir, 'data', { days: keepDays, atLeast: 1, now });
    const rows = made.tables.reduce((sum, table) => sum + table.rows, 0);
    console.log(
      `Backed up ${rows} rows of ${made.tables.length} tables and the files: ${join(dir, 'data', made.name)}`,
    );
    console.log(`${made.bytes} bytes${passphraseFile === null ? ', not encrypted' : ', encrypted'}.`);
    for (const name of [...oldKeys, ...oldData]) console.log(`Removed the older set ${name}.`);
    if (secretsTo !== null) await writeSecrets(settings, secretsTo);
  } finally {
    await closeDb();
    await connection.end();
  }
}

function argumentsGiven(): string | null {
  try {
    return parseArgs({ options: { 'secrets-to': { type: 'string' } } }).values['secrets-to'] ?? null;
  } catch (error) {
    throw new Ending(EXIT.usage, `${(error as Error).message}\nUsage: ops/backup.sh [--secrets-to FILE]`);
  }
}

function requirePassphrase(file: string | null): void {
  if (file === null || existsSync(file)) return;
  throw new SettingsError([`BITTERN_BACKUP_PASSPHRASE_FILE: there is no file ${file}`]);
}

/** Asked before anything is backed up, so that an ending with 2 means that nothing was done. */
function requirePlaceForSecrets({ passphraseFile, dir }: Config['backup'], path: string): void {
  if (passphraseFile === null) {
    throw new Ending(EXIT.usage, 'Secrets are written encrypted only: set BITTERN_BACKUP_PASSPHRASE_FILE.');
  }
  if (!relative(resolve(dir), resolve(path)).startsWith('..')) {
    throw new Ending(
      EXIT.usage,
      'Secrets are kept apart from backups: name a file outside BITTERN_BACKUP_DIR.',
    );
  }
  if (existsSync(path)) throw new Ending(EXIT.usage, `There is a file ${path} already: name another.`);
}

/** Writes the generated secrets, encrypted, to a place apart from the backups, which they would open. */
async function writeSecrets({ backup, dataDir }: Config, path: string): Promise<void> {
  const text = await readFile(join(dataDir, 'secrets.env'));
  await writeSealed(Readable.from([text]), path, 'secrets', backup.passphraseFile);
  console.log(`Secrets, encrypted: ${path}`);
}

process.exitCode = await exitCodeOf(backUp);
