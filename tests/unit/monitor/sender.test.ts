import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { Sender } from '#ingest/monitor/sender';
import { Spool } from '#ingest/monitor/spool';

interface Answer {
  status: number;
  headers?: Record<string, string>;
  body?: string;
}

let server: Server;
let serverUrl: string;
let directory: string;
let answers: Answer[];
let received: { intervals: unknown[]; bands: number[] }[];

beforeEach(async () => {
  directory = mkdtempSync(join(tmpdir(), 'bittern-sender-'));
  [answers, received] = [[], []];
  server = createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      received.push(JSON.parse(gunzipSync(Buffer.concat(chunks)).toString()));
      const { status, headers, body } = answers.shift() ?? { status: 500 };
      response.writeHead(status, headers).end(body);
    });
  });
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  serverUrl = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
});

afterEach(async () => {
  server.closeAllConnections();
  await new Promise((closed) => server.close(closed));
  rmSync(directory, { recursive: true });
});

const ACCEPTED: Answer = { status: 200, body: JSON.stringify({ accepted: 2, known: 0, refused: [] }) };

function senderWith(count: number): { spool: Spool; sender: Sender } {
  const spool = new Spool(directory);
  spool.append(Array.from({ length: count }, (_, at) => ({ startSec: at * 60, record: { at } })));
  return { spool, sender: new Sender(spool, { serverUrl, token: 't', bandsHz: [1000], batchSize: 2 }) };
}

test('a batch is forgotten only once the server has answered for it', async () => {
  const { spool, sender } = senderWith(3);
  answers = [{ status: 503, headers: { 'Retry-After': '7' } }, ACCEPTED];
  expect(await sender.sendOnce()).toMatchObject({ kind: 'later', waitSec: 7 });
  expect(spool.length).toBe(3);
  expect(await sender.sendOnce()).toMatchObject({ kind: 'sent', count: 2 });
  expect(spool.oldest(5)).toEqual([{ startSec: 120, record: { at: 2 } }]);
  expect(received[1]).toMatchObject({ bands: [1000], intervals: [{ at: 0 }, { at: 1 }] });
});

test('without Retry-After the wait grows from failure to failure', async () => {
  const { sender } = senderWith(1);
  answers = Array.from({ length: 5 }, () => ({ status: 500 }));
  const waits: number[] = [];
  for (let attempt = 0; attempt < 5; attempt += 1) {
    const outcome = await sender.sendOnce();
    if (outcome.kind === 'later') waits.push(outcome.waitSec);
  }
  expect(waits).toHaveLength(5);
  expect(waits[4]).toBeGreaterThan((waits[0] ?? 0) * 4);
});

test('of what is too large at once half is sent', async () => {
  const { spool, sender } = senderWith(2);
  answers = [{ status: 413 }, ACCEPTED, ACCEPTED];
  expect(await sender.sendOnce()).toMatchObject({ kind: 'later', waitSec: 0 });
  expect(spool.length).toBe(2);
  expect(await sender.sendOnce()).toMatchObject({ kind: 'sent', count: 1 });
  expect(await sender.sendOnce()).toMatchObject({ kind: 'sent', count: 1 });
});

test('a refused token keeps the records and says so', async () => {
  const { spool, sender } = senderWith(1);
  answers = [{ status: 401, body: 'no' }];
  expect(await sender.sendOnce()).toMatchObject({ kind: 'refused', status: 401 });
  expect(spool.length).toBe(1);
});
