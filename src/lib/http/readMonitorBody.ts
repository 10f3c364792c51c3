import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import { createGunzip } from 'node:zlib';
import { MOST_BODY_BYTES } from '#lib/contracts/intervals';
import { Problem } from './problem';

/**
 * Text of a monitor's request, inflated when it says gzip. Bytes are counted while they come, packed and unpacked, and reading
 * stops at the limit: what inflates without end is never inflated.
 * @throws {Problem} 413 too large, 415 wrong type or encoding, 422 broken gzip.
 */
export async function readMonitorBody(request: Request): Promise<string> {
  requireJson(request);
  const isGzip = requireKnownEncoding(request) === 'gzip';
  if (!request.body) return '';
  const packed = Readable.fromWeb(request.body as ReadableStream);
  const plain = isGzip ? packed.pipe(createGunzip()) : packed;
  packed.once('error', (error) => plain.destroy(error));
  try {
    return await readUpToLimit(plain);
  } catch (error) {
    if (error instanceof Problem || !isGzip) throw error;
    throw new Problem(
      422,
      'unreadable',
      'No intervals could be read',
      'The gzip data are broken or cut short.',
    );
  } finally {
    packed.destroy();
    plain.destroy();
  }
}

async function readUpToLimit(stream: AsyncIterable<Buffer>): Promise<string> {
  const chunks: Buffer[] = [];
  let bytes = 0;
  for await (const chunk of stream) {
    bytes += chunk.length;
    if (bytes > MOST_BODY_BYTES) {
      throw new Problem(
        413,
        'too-large',
        'Too large',
        'A post may have at most 8 MiB unpacked; send smaller batches.',
      );
    }
    chunks.push(chunk);
  }
  return Buffer.concat(chunks, bytes).toString('utf8');
}

function requireJson(request: Request): void {
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/json\s*(;|$)/i.test(type)) {
    throw new Problem(
      415,
      'wrong-type',
      'Wrong content type',
      'Send JSON with Content-Type: application/json.',
    );
  }
}

function requireKnownEncoding(request: Request): 'gzip' | 'identity' {
  const encoding = (request.headers.get('content-encoding') ?? 'identity').trim().toLowerCase();
  if (encoding === 'gzip' || encoding === 'identity') return encoding;
  throw new Problem(415, 'wrong-encoding', 'Wrong content encoding', 'Send gzip, or no Content-Encoding.');
}
