import { expect, test } from 'vitest';
import {
  PART_BYTES,
  uploadInParts,
  UploadRefused,
  type UploadProgress,
} from '#components/imports/uploadInParts.ts';

const BASE = '/api/v1/networks/quay/imports/uploads';
const size = 2 * PART_BYTES + 1234;
const content = new Uint8Array(size).map((_, at) => (at * 31) % 251);
const file = new File([content], 'card.csv', { lastModified: 1_764_600_000_000 });

/** A server that keeps one upload; `breaks` says of each request, by its number, what becomes of it. */
class FakeServer {
  received = new Uint8Array(0);
  requests = 0;
  marks: unknown[] = [];

  constructor(private readonly breaks: (request: number) => 'before' | 'after' | number | null) {}

  ask = async (address: string, { method, body, headers }: RequestInit): Promise<Response> => {
    this.requests += 1;
    const fate = this.breaks(this.requests);
    if (fate === 'before') throw new TypeError('no line');
    if (typeof fate === 'number') return problem(fate);
    const answer = await this.answer(address, method ?? 'GET', body, new Headers(headers));
    if (fate === 'after') throw new TypeError('the answer was lost');
    return answer;
  };

  private async answer(address: string, method: string, body: unknown, headers: Headers): Promise<Response> {
    if (address === BASE) {
      this.marks.push((JSON.parse(String(body)) as { mark: string }).mark);
      return Response.json({ upload: { id: 7, offset: this.received.length } });
    }
    if (address === `${BASE}/7/finish`) return Response.json({ import: { id: 42 } }, { status: 201 });
    expect([address, method]).toEqual([`${BASE}/7/content`, 'PUT']);
    const part = new Uint8Array(await (body as Blob).arrayBuffer());
    const first = Number(/^bytes (\d+)-/.exec(headers.get('content-range') ?? '')?.[1]);
    if (first !== this.received.length) return problem(409, { offset: this.received.length });
    const joined = new Uint8Array(first + part.length);
    joined.set(this.received);
    joined.set(part, first);
    this.received = joined;
    return Response.json({ upload: { id: 7, offset: joined.length } });
  }
}

function problem(status: number, members: Record<string, unknown> = {}): Response {
  return Response.json({ status, detail: `Words of ${status}.`, ...members }, { status });
}

async function upload(server: FakeServer, signal = new AbortController().signal) {
  const waitsMs: number[] = [];
  const shown: UploadProgress[] = [];
  const id = await uploadInParts(
    { base: BASE, station: 'QY-1', file, signal, onProgress: (progress) => shown.push(progress) },
    { ask: server.ask, waitMs: async (ms) => void waitsMs.push(ms) },
  );
  return { id, waitsMs, shown };
}

test('a file arrives whole though requests and answers are lost, with longer and longer waits', async () => {
  const server = new FakeServer(
    (request) => ({ 2: 'before', 3: 503, 4: 'after', 6: 'after' })[request] as 'before' | null,
  );
  const { id, waitsMs, shown } = await upload(server);
  expect(id).toBe(42);
  expect(Buffer.from(content).equals(server.received)).toBe(true);
  expect(waitsMs).toEqual([1000, 2000, 4000, 1000]);
  expect(shown.at(-1)).toEqual({ sentBytes: size, wholeBytes: size, waitSec: null });
});

test('the same file goes on where it ended, under the same mark', async () => {
  const stop = new AbortController();
  const server = new FakeServer((request) => (request === 3 ? (stop.abort(), 'before') : null));
  await expect(upload(server, stop.signal)).rejects.toThrow();
  expect(server.received).toHaveLength(PART_BYTES);
  await upload(server);
  expect(Buffer.from(content).equals(server.received)).toBe(true);
  expect(new Set(server.marks).size).toBe(1);
});

test('what waiting does not change is told in the words of the server', async () => {
  const refused = upload(new FakeServer((request) => (request === 1 ? 413 : null)));
  await expect(refused).rejects.toThrow(new UploadRefused('Words of 413.'));
});
