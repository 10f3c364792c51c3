import { promisify } from 'node:util';
import { gunzip, gunzipSync } from 'node:zlib';
import { MOST_BODY_BYTES } from '#lib/contracts/intervals';
import type { HeldBytes } from './heldBytes';
import type { MonitorRequest } from './monitorRequest';
import { Problem } from './problem';

const inflateInPool = promisify(gunzip);

/** Up to here inflating at once costs less than going to another thread and back. */
const SMALL_BYTES = 64 * 1024;
const LARGEST_CHUNK_BYTES = 1024 * 1024;

/** A body as it came, not yet inflated. */
export interface MonitorBody {
  bytes: Buffer;
  isGzip: boolean;
}

/**
 * The body of a monitor's request as it came. Bytes are counted while they come, and reading stops at the limit.
 * @throws {Problem} 413 too large, 415 wrong type or encoding, 503 when too much is being read at once.
 */
export async function readMonitorBody(
  { headers, body }: MonitorRequest,
  held: HeldBytes,
): Promise<MonitorBody> {
  requireJson(headers.get('content-type') ?? '');
  const isGzip = requireKnownEncoding(headers.get('content-encoding') ?? 'identity') === 'gzip';
  return { bytes: body ? await held.collect(body, MOST_BODY_BYTES, tooLarge) : Buffer.alloc(0), isGzip };
}

/**
 * The bytes of a body, inflated when it is gzip: outside this thread unless it is small, and never beyond the limit.
 * @throws {Problem} 413 too large, 422 broken gzip.
 */
export async function bytesOfBody({ bytes, isGzip }: MonitorBody): Promise<Buffer> {
  if (!isGzip || bytes.length === 0) return bytes;
  try {
    return await inflate(bytes);
  } catch (error) {
    const { code = '' } = error as { code?: string };
    if (code === 'ERR_BUFFER_TOO_LARGE') throw tooLarge();
    if (!code.startsWith('Z_')) throw error;
    throw new Problem(
      422,
      'unreadable',
      'No intervals could be read',
      'The gzip data are broken or cut short.',
    );
  }
}

/** Whether a body is small, as far as can be told before it is inflated. */
export function isSmallBody({ bytes, isGzip }: MonitorBody): boolean {
  return bytes.length <= SMALL_BYTES && (!isGzip || claimedBytes(bytes) <= SMALL_BYTES);
}

/** What gzip says of its size; it may lie. */
function claimedBytes(bytes: Buffer): number {
  return bytes.length < 18 ? 0 : bytes.readUInt32LE(bytes.length - 4);
}

async function inflate(bytes: Buffer): Promise<Buffer> {
  if (isSmallBody({ bytes, isGzip: true })) {
    const small = inflateSmall(bytes, claimedBytes(bytes));
    if (small) return small;
  }
  // What gzip says of its size only chooses the size of the pieces.
  const chunkSize = Math.min(LARGEST_CHUNK_BYTES, Math.max(SMALL_BYTES, claimedBytes(bytes) + 64));
  return inflateInPool(bytes, { maxOutputLength: MOST_BODY_BYTES, chunkSize });
}

function inflateSmall(bytes: Buffer, claimed: number): Buffer | null {
  try {
    return gunzipSync(bytes, { maxOutputLength: 2 * SMALL_BYTES, chunkSize: Math.max(1024, claimed + 64) });
  } catch (error) {
    if ((error as { code?: string }).code === 'ERR_BUFFER_TOO_LARGE') return null;
    throw error;
  }
}

function tooLarge(): Problem {
  return new Problem(
    413,
    'too-large',
    'Too large',
    'A post may have at most 8 MiB unpacked; send smaller batches.',
  );
}

function requireJson(type: string): void {
  if (!/^application\/json\s*(;|$)/i.test(type)) {
    throw new Problem(
      415,
      'wrong-type',
      'Wrong content type',
      'Send JSON with Content-Type: application/json.',
    );
  }
}

function requireKnownEncoding(encoding: string): 'gzip' | 'identity' {
  const known = encoding.trim().toLowerCase();
  if (known === 'gzip' || known === 'identity') return known;
  throw new Problem(415, 'wrong-encoding', 'Wrong content encoding', 'Send gzip, or no Content-Encoding.');
}
