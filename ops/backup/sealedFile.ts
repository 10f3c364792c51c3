import { createHash } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { type Readable, Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { createGunzip, createGzip } from 'node:zlib';
import { startTool, type Tool } from './tool';

/** A file of a backup as it stands on disk. */
export interface FileFacts {
  name: string;
  bytes: number;
  sha256: string;
}

/** More work gains little in size and slows what runs beside it. */
const GZIP_LEVEL = 3;

/**
 * Writes a file: compressed and, with a passphrase, encrypted by `openssl enc` (AES-256-CBC, PBKDF2 with 600 000 rounds). It is
 * durable when the promise resolves.
 */
export async function writeSealed(
  source: AsyncIterable<string | Uint8Array>,
  path: string,
  name: string,
  passphraseFile: string | null,
): Promise<FileFacts> {
  const hash = createHash('sha256');
  let bytes = 0;
  const meter = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      bytes += chunk.length;
      hash.update(chunk);
      done(null, chunk);
    },
  });
  const output = createWriteStream(path, { flags: 'wx', mode: 0o600, flush: true });
  const gzip = createGzip({ level: GZIP_LEVEL });
  if (passphraseFile === null) await pipeline(source, gzip, meter, output);
  else {
    const openssl = startOpenssl(passphraseFile, []);
    await together(openssl, pipeline(source, gzip, openssl.input), pipeline(openssl.output, meter, output));
  }
  return { name, bytes, sha256: hash.digest('hex') };
}

/** Reads a file that `writeSealed` wrote into `take`. @throws where the passphrase is another, or the file is damaged. */
export async function readSealed(
  path: string,
  passphraseFile: string | null,
  take: (plain: Readable) => Promise<void>,
): Promise<void> {
  const gunzip = createGunzip();
  if (passphraseFile === null) {
    await Promise.all([pipeline(createReadStream(path), gunzip), take(gunzip)]);
    return;
  }
  const openssl = startOpenssl(passphraseFile, ['-d']);
  const ways = [
    pipeline(createReadStream(path), openssl.input),
    pipeline(openssl.output, gunzip),
    take(gunzip),
  ];
  await together(openssl, ...ways);
}

function startOpenssl(passphraseFile: string, args: string[]): Tool {
  const cipher = [
    'enc',
    '-aes-256-cbc',
    '-pbkdf2',
    '-iter',
    '600000',
    '-salt',
    '-pass',
    `file:${passphraseFile}`,
  ];
  return startTool('openssl', [...cipher, ...args]);
}

/** Waits for a program and all that flows through it; of several errors the program's own is told, which says most. */
async function together(tool: Tool, ...ways: Promise<void>[]): Promise<void> {
  const [own, ...rest] = await Promise.allSettled([tool.ended, ...ways]);
  const failed = [own, ...rest].find((outcome) => outcome.status === 'rejected');
  if (failed) throw failed.reason;
}
