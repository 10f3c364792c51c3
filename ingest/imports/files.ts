import { createHash, randomUUID } from 'node:crypto';
import { mkdir, open, readdir, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { neededPartKeys } from '#db/queries/importUploads';
import { neededFileKeys } from '#db/queries/imports';
import { config } from '#lib/config/index';
import { UnusableFile } from '#lib/services/imports/unusable';
import { inflated } from './inflate';

const FILE = /^([0-9a-f-]{36})\.(csv|part)$/;
/** An upload that nobody has finished by then never will be. */
const UNCLAIMED_MS = 24 * 3_600_000;

export interface KeptFile {
  key: string;
  bytes: number;
  digest: Buffer;
}

/** Where an import's file is. */
export function importPath(key: string): string {
  return join(config().dataDir, 'imports', `${key}.csv`);
}

/** Where the parts of a file are that is not wholly here yet. */
export function partPath(key: string): string {
  return join(config().dataDir, 'imports', `${key}.part`);
}

/**
 * Streams a file to disk, unpacked where it is gzip; it is durable when the promise resolves, and gone when it rejects.
 * @throws {UnusableFile}
 */
export async function keepFile(source: AsyncIterable<Uint8Array>): Promise<KeptFile> {
  const key = randomUUID();
  const path = importPath(key);
  await mkdir(join(config().dataDir, 'imports'), { recursive: true });
  const file = await open(path, 'wx', 0o600);
  const hash = createHash('sha256');
  let bytes = 0;
  try {
    for await (const part of inflated(upToMost(source))) {
      bytes += part.length;
      if (bytes > config().importMostBytes) throw tooLarge();
      hash.update(part);
      await file.write(part);
    }
    await file.sync();
  } catch (error) {
    await rm(path, { force: true });
    throw error;
  } finally {
    await file.close();
  }
  return { key, bytes, digest: hash.digest() };
}

/** Deletes an import's file, if it is there. */
export async function removeFile(key: string): Promise<void> {
  await rm(importPath(key), { force: true });
}

/** The first bytes of an import's file. */
export async function readHead(key: string, mostBytes: number): Promise<Buffer> {
  const file = await open(importPath(key));
  try {
    const { buffer, bytesRead } = await file.read(Buffer.alloc(mostBytes), 0, mostBytes, 0);
    return buffer.subarray(0, bytesRead);
  } finally {
    await file.close();
  }
}

/** Deletes files that no import or upload needs: what broke off, and what is left of discarded ones. @returns how many. */
export async function removeUnclaimedFiles(now: Date): Promise<number> {
  const names = await readdir(join(config().dataDir, 'imports')).catch(() => []);
  const keysOf = (ending: string) =>
    names.flatMap((name) => {
      const match = FILE.exec(name);
      return match?.[1] && match[2] === ending ? [match[1]] : [];
    });
  const needed = await neededFileKeys(keysOf('csv'));
  const neededParts = await neededPartKeys(keysOf('part'));
  const unclaimed = [
    ...keysOf('csv').flatMap((key) => (needed.has(key) ? [] : [importPath(key)])),
    ...keysOf('part').flatMap((key) => (neededParts.has(key) ? [] : [partPath(key)])),
  ];
  let removed = 0;
  for (const path of unclaimed) {
    const { mtimeMs } = await stat(path);
    if (now.getTime() - mtimeMs < UNCLAIMED_MS) continue;
    await rm(path, { force: true });
    removed += 1;
  }
  return removed;
}

/** What comes in, packed or not; nobody may send more than a file may hold. */
async function* upToMost(source: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array> {
  let bytes = 0;
  for await (const part of source) {
    bytes += part.length;
    if (bytes > config().importMostBytes) throw tooLarge();
    yield part;
  }
}

/** Why a file is not taken that has more bytes than the settings allow. */
export function tooLarge(): UnusableFile {
  const mostMib = Math.floor(config().importMostBytes / 1024 / 1024);
  return new UnusableFile('too-large', `A file may have at most ${mostMib} MiB. Nothing of it was kept.`);
}
