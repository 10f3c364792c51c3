import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
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
  const sent = Readable.fromWeb(request.body as ReadableStream<Uint8Array>);
  const chunks: Uint8Array[] = [];
  const collect = async (source: AsyncIterable<Uint8Array>) => {
    for await (const chunk of source) chunks.push(chunk);
  };
  try {
    if (isGzip) await pipeline(sent, upToLimit, createGunzip(), upToLimit, collect);
    else await pipeline(sent, upToLimit, collect);
  } catch (error) {
    throw isBrokenGzip(error)
      ? new Problem(422, 'unreadable', 'No intervals could be read', 'The gzip data are broken or cut short.')
      : error;
  }
  return Buffer.concat(chunks).toString('utf8');
}

async function* upToLimit(source: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array> {
  let bytes = 0;
  for await (const chunk of source) {
    bytes += chunk.length;
    if (bytes > MOST_BODY_BYTES) {
      throw new Problem(
        413,
        'too-large',
        'Too large',
        'A post may have at most 8 MiB unpacked; send smaller batches.',
      );
    }
    yield chunk;
  }
}

function isBrokenGzip(error: unknown): boolean {
  return /^Z_/.test((error as { code?: string }).code ?? '');
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
