import { pipeline } from 'node:stream/promises';
import { PassThrough, Readable } from 'node:stream';
import { createGunzip } from 'node:zlib';
import { UnusableFile } from '#lib/services/imports/unusable';

/** The first bytes of every gzip file (RFC 1952); no text begins with them. */
const GZIP_MARK = Buffer.from([0x1f, 0x8b]);

/**
 * A file as it is, or unpacked where its first bytes say gzip. What inflates without end is stopped by whoever counts what comes out.
 * @throws {UnusableFile} for broken gzip.
 */
export async function* inflated(source: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array> {
  const chunks = source[Symbol.asyncIterator]();
  const head = await headOf(chunks);
  const whole = resumed(head, chunks);
  yield* head.subarray(0, GZIP_MARK.length).equals(GZIP_MARK) ? gunzipped(whole) : whole;
}

async function headOf(chunks: AsyncIterator<Uint8Array>): Promise<Buffer> {
  let head = Buffer.alloc(0);
  while (head.length < GZIP_MARK.length) {
    const { done, value } = await chunks.next();
    if (done) break;
    head = Buffer.concat([head, value]);
  }
  return head;
}

async function* resumed(head: Buffer, chunks: AsyncIterator<Uint8Array>): AsyncGenerator<Uint8Array> {
  if (head.length > 0) yield head;
  for (let next = await chunks.next(); !next.done; next = await chunks.next()) yield next.value;
}

async function* gunzipped(packed: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array> {
  const unpacked = new PassThrough();
  const done = pipeline(Readable.from(packed), createGunzip(), unpacked);
  // Whoever reads `unpacked` gets the failure too; unheard here it would end the process.
  done.catch(() => undefined);
  try {
    for await (const chunk of unpacked) yield chunk as Uint8Array;
    await done;
  } catch (error) {
    throw isBrokenGzip(error)
      ? new UnusableFile('unreadable', 'The gzip data are broken or cut short. Nothing of the file was kept.')
      : error;
  }
}

function isBrokenGzip(error: unknown): boolean {
  return /^Z_/.test((error as { code?: string }).code ?? '');
}
