import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import { Problem } from './problem';

/** Bytes of a request's body, counted while they come; reading stops at the limit. @throws {Problem} 413 */
export async function readBytes(request: Request, mostBytes: number): Promise<Uint8Array<ArrayBuffer>> {
  const chunks: Uint8Array[] = [];
  let byteCount = 0;
  const body = request.body
    ? Readable.fromWeb(request.body as ReadableStream<Uint8Array>)
    : Readable.from([]);
  for await (const chunk of body) {
    byteCount += chunk.length;
    if (byteCount > mostBytes) throw tooLarge(mostBytes);
    chunks.push(chunk);
  }
  const bytes = new Uint8Array(byteCount);
  let at = 0;
  for (const chunk of chunks) {
    bytes.set(chunk, at);
    at += chunk.length;
  }
  return bytes;
}

/** The same request with its body read into memory up to a limit. @throws {Problem} 413 */
export async function boundedRequest(request: Request, mostBytes: number): Promise<Request> {
  const body = await readBytes(request, mostBytes);
  return new Request(request.url, { method: request.method, headers: request.headers, body });
}

function tooLarge(mostBytes: number): Problem {
  const mebibytes = Math.floor(mostBytes / 1024 / 1024);
  return new Problem(413, 'too-large', 'Too large', `At most ${mebibytes} MiB are taken. Nothing was kept.`);
}
