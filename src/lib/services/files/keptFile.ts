import { createHash, randomBytes } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { mkdir, open, readFile, rename, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { type Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { config } from '#lib/config/index';

/** Folders of the data directory that hold what people uploaded and what was issued, each file under the name of its own digest. */
export type KeptFolder = 'certificates' | 'photos' | 'marks' | 'summaries';

/**
 * Writes a file into the data directory, outside everything that is served, and answers its SHA-256. It is durable when the
 * promise resolves.
 */
export async function keepFile(folder: KeptFolder, bytes: Uint8Array): Promise<Buffer> {
  const sha256 = createHash('sha256').update(bytes).digest();
  const path = pathOf(folder, sha256);
  await mkdir(directory(folder), { recursive: true, mode: 0o700 });
  const unfinished = `${path}.${randomBytes(6).toString('hex')}`;
  const file = await open(unfinished, 'wx', 0o600);
  try {
    await file.writeFile(bytes);
    await file.sync();
  } finally {
    await file.close();
  }
  await rename(unfinished, path);
  return sha256;
}

/** A file's bytes; null when it is gone or is no longer what was uploaded. */
export async function readKeptFile(folder: KeptFolder, sha256: Buffer): Promise<Buffer | null> {
  try {
    const bytes = await readFile(pathOf(folder, sha256));
    return createHash('sha256').update(bytes).digest().equals(sha256) ? bytes : null;
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') return null;
    throw error;
  }
}

/** A file’s bytes as a stream, told whole beforehand; null when it is gone or is no longer what was kept. */
export async function streamKeptFile(folder: KeptFolder, sha256: Buffer): Promise<Readable | null> {
  const path = pathOf(folder, sha256);
  const hash = createHash('sha256');
  try {
    await pipeline(createReadStream(path), hash);
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') return null;
    throw error;
  }
  return hash.digest().equals(sha256) ? createReadStream(path) : null;
}

/** Removes a file; one that is gone is no error. */
export async function removeKeptFile(folder: KeptFolder, sha256: Buffer): Promise<void> {
  await rm(pathOf(folder, sha256), { force: true });
}

function directory(folder: KeptFolder): string {
  return join(config().dataDir, folder);
}

function pathOf(folder: KeptFolder, sha256: Buffer): string {
  return join(directory(folder), sha256.toString('hex'));
}
