import { createServer, request as httpRequest, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { makeFront } from '#ops/http/front';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

useFreshSchema();

let server: Server;
let token: string;

beforeAll(async () => {
  const astro = (_request: unknown, response: { end(text: string): void }) => response.end('a page');
  const settings = { allowedHosts: ['bittern.example'], trustedProxies: 0, origin: 'http://bittern.example' };
  server = createServer(makeFront(astro as never, { ...settings, importMostBytes: 1024 * 1024 }));
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  const stationId = await makeStation(await makeNetwork('quay'), 'QY-1');
  token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
});

afterAll(() => new Promise((closed) => server.close(closed)));

interface Answer {
  status: number;
  headers: Record<string, unknown>;
  text: string;
}

/** A request as a monitor sends it; of a list of chunks no length is told beforehand. */
function ask(method: string, headers: Record<string, string>, body: Buffer | Buffer[]): Promise<Answer> {
  const { port } = server.address() as AddressInfo;
  return new Promise((answered, failed) => {
    const sending = httpRequest(
      { host: '127.0.0.1', port, method, path: '/api/v1/intervals', agent: false, headers },
      (response) => {
        const chunks: Buffer[] = [];
        response.on('data', (chunk: Buffer) => chunks.push(chunk));
        response.on('end', () =>
          answered({
            status: response.statusCode ?? 0,
            headers: response.headers,
            text: String(Buffer.concat(chunks)),
          }),
        );
      },
    );
    sending.on('error', failed);
    if (Array.isArray(body)) for (const chunk of body) sending.write(chunk);
    sending.end(Array.isArray(body) ? undefined : body);
  });
}

const headers = () => ({
  host: 'bittern.example',
  authorization: `Bearer ${token}`,
  'content-type': 'application/json',
});
const postAt = (start: string) =>
  Buffer.from(JSON.stringify({ bands: [], intervals: [{ start, seconds: 60, LAeq: 52.3 }] }));

test('what the front hands over itself is answered as the pages’ server would', async () => {
  const body = postAt('2026-03-01T00:00:00Z');
  const first = await ask('POST', headers(), body);
  expect(first.status).toBe(200);
  expect(first.headers).toMatchObject({
    'content-type': 'application/json; charset=utf-8',
    'cache-control': 'no-store',
    'x-content-type-options': 'nosniff',
  });
  expect(JSON.parse(first.text)).toMatchObject({ accepted: 1, known: 0, refused: [] });
  const packed = await ask('POST', { ...headers(), 'content-encoding': 'gzip' }, gzipSync(body));
  expect(JSON.parse(packed.text)).toMatchObject({ accepted: 0, known: 1 });
  const routed = await callApi('POST', '/api/v1/intervals', { token, body: JSON.parse(String(body)) });
  expect(await routed.json()).toMatchObject({ accepted: 0, known: 1 });
});

test('problems are told as elsewhere', async () => {
  const body = postAt('2026-03-01T00:01:00Z');
  expect((await ask('POST', { ...headers(), host: 'elsewhere.example' }, body)).status).toBe(421);
  const unknown = await ask('POST', { ...headers(), authorization: 'Bearer bs_unknown' }, body);
  expect(unknown.status).toBe(401);
  expect(unknown.headers).toMatchObject({
    'content-type': 'application/problem+json',
    'www-authenticate': 'Bearer',
  });
  expect((await ask('POST', { ...headers(), 'content-type': 'text/plain' }, body)).status).toBe(415);
  expect((await ask('POST', headers(), Buffer.from('{'))).status).toBe(422);
  expect(
    await db()('interval_levels').where({ starts_at: Date.parse('2026-03-01T00:01:00Z') / 1000 }),
  ).toEqual([]);
});

test('reading stops at the limit, whether a length was told or not, and the monitor hears why', async () => {
  const piece = Buffer.alloc(1024 * 1024, ' ');
  expect((await ask('POST', headers(), Array<Buffer>(9).fill(piece))).status).toBe(413);
  expect((await ask('POST', headers(), Buffer.concat(Array<Buffer>(9).fill(piece)))).status).toBe(413);
});

test('other methods go on to the pages’ server', async () => {
  expect(await ask('GET', { host: 'bittern.example' }, Buffer.alloc(0))).toMatchObject({
    status: 200,
    text: 'a page',
  });
});
