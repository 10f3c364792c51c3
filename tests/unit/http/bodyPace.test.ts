import { createServer, request as httpRequest, type ClientRequest, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { BodyPace } from '#ops/http/bodyPace';

let server: Server;
let pace: BodyPace;
/** What the handler does with a body. */
let isRead: boolean;

beforeEach(async () => {
  pace = new BodyPace();
  isRead = true;
  server = createServer((request, response) => {
    pace.watch(request);
    if (isRead) request.resume().on('end', () => response.end('taken'));
  });
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
});

afterEach(() => new Promise((closed) => server.close(closed).closeAllConnections()));

/** Begins a post of a length that is never sent in full. @returns the request, and whether it was ended by the server. */
async function begin(first: Buffer): Promise<{ sending: ClientRequest; state: { isEnded: boolean } }> {
  const { port } = server.address() as AddressInfo;
  const state = { isEnded: false };
  const headers = { 'content-length': 1_000_000 };
  const sending = httpRequest({ host: '127.0.0.1', port, method: 'POST', agent: false, headers });
  sending.on('error', () => (state.isEnded = true));
  const arrived = new Promise((seen) => server.once('request', seen));
  sending.write(first);
  await arrived;
  return { sending, state };
}

const aMoment = () => new Promise((over) => setTimeout(over, 60));

test('a body that dribbles is ended at the second look, not at the first', async () => {
  const { sending, state } = await begin(Buffer.alloc(10));
  await aMoment();
  pace.look();
  sending.write(Buffer.alloc(100));
  await aMoment();
  expect(state.isEnded).toBe(false);
  pace.look();
  await aMoment();
  expect(state.isEnded).toBe(true);
});

test('a body that goes on is left alone', async () => {
  const { sending, state } = await begin(Buffer.alloc(10));
  for (let look = 0; look < 4; look += 1) {
    sending.write(Buffer.alloc(5_000));
    await aMoment();
    pace.look();
  }
  await aMoment();
  expect(state.isEnded).toBe(false);
  sending.destroy();
});

test('who waits for us is left alone', async () => {
  isRead = false;
  const { sending, state } = await begin(Buffer.alloc(5_000));
  await aMoment();
  for (let look = 0; look < 3; look += 1) pace.look();
  await aMoment();
  expect(state.isEnded).toBe(false);
  sending.destroy();
});
