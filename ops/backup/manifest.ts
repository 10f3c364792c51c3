import { createHash, createHmac, pbkdf2Sync, timingSafeEqual } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { open, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { z } from 'zod';
import { Ending, EXIT } from './ending';

const digest = z.string().regex(/^[0-9a-f]{64}$/);

const manifestSchema = z.strictObject({
  format: z.literal(1),
  kind: z.enum(['data', 'keys']),
  madeAt: z.iso.datetime(),
  server: z.string(),
  /** The newest migration that the database had. */
  migration: z.string(),
  isEncrypted: z.boolean(),
  binaryLog: z.strictObject({ file: z.string(), position: z.number().int() }).nullable(),
  files: z.array(
    z.strictObject({ name: z.string().regex(/^[\w.-]+$/), bytes: z.number().int(), sha256: digest }),
  ),
  tables: z.array(z.strictObject({ name: z.string(), rows: z.number().int(), sha256: digest })),
});

/** What a set of a backup holds: its files as they stand on disk, and every table's rows. */
export type Manifest = z.infer<typeof manifestSchema>;

const MANIFEST = 'manifest.json';
const CHECK = 'manifest.check';
const ROUNDS = 600_000;

/** Writes a set's manifest, and beside it what tells whether the manifest is changed. */
export async function writeManifest(
  directory: string,
  manifest: Manifest,
  passphraseFile: string | null,
): Promise<void> {
  const text = `${JSON.stringify(manifest, null, 2)}\n`;
  await writeDurably(join(directory, MANIFEST), text);
  await writeDurably(join(directory, CHECK), `${await checkOf(text, passphraseFile)}\n`);
}

/**
 * Reads a set's manifest and compares every file with it.
 * @throws {Ending} when anything is missing, more, or not as it was written.
 */
export async function readVerified(directory: string, passphraseFile: string | null): Promise<Manifest> {
  const text = await readFile(join(directory, MANIFEST), 'utf8').catch(() => {
    throw new Ending(EXIT.usage, `${directory} is no backup: it has no ${MANIFEST}.`);
  });
  const check = (await readFile(join(directory, CHECK), 'utf8').catch(() => '')).trim();
  const isEncrypted = /"isEncrypted": true/.test(text);
  if (isEncrypted && passphraseFile === null) {
    throw new Ending(EXIT.usage, `${directory} is encrypted: set BITTERN_BACKUP_PASSPHRASE_FILE.`);
  }
  const expected = await checkOf(text, isEncrypted ? passphraseFile : null);
  if (!isSame(expected, check)) {
    throw new Ending(
      EXIT.notAsWritten,
      `${join(directory, MANIFEST)} is not as it was written${isEncrypted ? ', or the passphrase is another' : ''}.`,
    );
  }
  const manifest = manifestSchema.parse(JSON.parse(text));
  for (const file of manifest.files) {
    if ((await digestOf(join(directory, file.name))) !== file.sha256) {
      throw new Ending(EXIT.notAsWritten, `${join(directory, file.name)} is not as it was written.`);
    }
  }
  return manifest;
}

/** SHA-256 of a file, hexadecimal; empty where there is none. */
export async function digestOf(path: string): Promise<string> {
  const hash = createHash('sha256');
  try {
    await pipeline(createReadStream(path), hash);
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') return '';
    throw error;
  }
  return hash.digest('hex');
}

/** With a passphrase nobody without it can make a manifest that passes; without one this finds damage, not malice. */
async function checkOf(text: string, passphraseFile: string | null): Promise<string> {
  if (passphraseFile === null) return createHash('sha256').update(text).digest('hex');
  const passphrase = (await readFile(passphraseFile, 'utf8')).split('\n')[0] ?? '';
  const key = pbkdf2Sync(passphrase, 'bittern backup manifest', ROUNDS, 32, 'sha256');
  return createHmac('sha256', key).update(text).digest('hex');
}

function isSame(expected: string, given: string): boolean {
  return expected.length === given.length && timingSafeEqual(Buffer.from(expected), Buffer.from(given));
}

async function writeDurably(path: string, text: string): Promise<void> {
  const file = await open(path, 'wx', 0o600);
  try {
    await file.writeFile(text);
    await file.sync();
  } finally {
    await file.close();
  }
}
