import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import { badRequest } from './problem';

/** One part of a posted form. Its body is read before the next part comes; what is not read is passed over. */
export interface FormPart {
  name: string;
  /** Null for a field that is no file. */
  fileName: string | null;
  body: AsyncIterable<Uint8Array>;
}

const MOST_HEADER_BYTES = 16 * 1024;

/**
 * The parts of a `multipart/form-data` request (RFC 7578) as they come in, so that a large file never stands in memory.
 * @throws {Problem} 400 for what is no such form, or one that breaks off.
 */
export async function* formParts(request: Request): AsyncGenerator<FormPart> {
  const type = request.headers.get('content-type') ?? '';
  const boundary = /^multipart\/form-data\s*;.*\bboundary=(?:"([^"]{1,70})"|([^\s;"]{1,70}))/i.exec(type);
  if (!boundary || !request.body) throw badRequest('Send the form as multipart/form-data.');
  const mark = Buffer.from(`\r\n--${boundary[1] ?? boundary[2]}`);
  const reader = new MarkReader(Readable.fromWeb(request.body as ReadableStream<Uint8Array>));
  await drain(reader.until(mark));
  while ((await reader.take(2)).toString('latin1') === '\r\n') {
    const headers = await textOf(reader.until(Buffer.from('\r\n\r\n')), MOST_HEADER_BYTES);
    const body = reader.until(mark);
    yield { ...disposition(headers), body };
    await drain(body);
  }
}

/** The text of a part that is no file. @throws {Problem} 400 when it is longer than `mostBytes`. */
export async function textOf(body: AsyncIterable<Uint8Array>, mostBytes: number): Promise<string> {
  const chunks: Uint8Array[] = [];
  let bytes = 0;
  for await (const chunk of body) {
    bytes += chunk.length;
    if (bytes > mostBytes) throw badRequest('A field of the form is too long.');
    chunks.push(chunk);
  }
  return Buffer.concat(chunks).toString('utf8');
}

async function drain(body: AsyncIterable<Uint8Array>): Promise<void> {
  for await (const chunk of body) void chunk;
}

function disposition(headers: string): Pick<FormPart, 'name' | 'fileName'> {
  const line = /^content-disposition:\s*form-data\s*;(.*)$/im.exec(headers)?.[1] ?? '';
  const value = (name: string) => new RegExp(`(?:^|[;\\s])${name}="([^"]*)"`, 'i').exec(line)?.[1] ?? null;
  const name = value('name');
  if (name === null) throw badRequest('A part of the form has no name.');
  return { name, fileName: value('filename')?.replaceAll('%22', '"') ?? null };
}

/** Reads a stream from one mark to the next. */
class MarkReader {
  /** A form begins with a mark, whose line break is not sent. */
  private kept = Buffer.from('\r\n');
  private readonly chunks: AsyncIterator<Uint8Array>;

  constructor(source: AsyncIterable<Uint8Array>) {
    this.chunks = source[Symbol.asyncIterator]();
  }

  /** What comes before the next mark; the mark itself is passed over. A second reading gives nothing. */
  async *until(mark: Buffer): AsyncGenerator<Uint8Array> {
    for (;;) {
      const at = this.kept.indexOf(mark);
      const safe = at < 0 ? Math.max(0, this.kept.length - mark.length + 1) : at;
      if (safe > 0) yield this.kept.subarray(0, safe);
      this.kept = this.kept.subarray(at < 0 ? safe : safe + mark.length);
      if (at >= 0) return;
      await this.fill();
    }
  }

  /** The next bytes. */
  async take(count: number): Promise<Buffer> {
    while (this.kept.length < count) await this.fill();
    const taken = this.kept.subarray(0, count);
    this.kept = this.kept.subarray(count);
    return taken;
  }

  private async fill(): Promise<void> {
    const { done, value } = await this.chunks.next();
    if (done) throw badRequest('The form broke off.');
    this.kept = Buffer.concat([this.kept, value]);
  }
}
