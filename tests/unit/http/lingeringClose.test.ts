import { once } from 'node:events';
import { createServer, type Server } from 'node:http';
import { connect, type AddressInfo, type Socket } from 'node:net';
import { afterEach, expect, test } from 'vitest';
import { makeFront } from '#ops/http/front';
import { closeLingering } from '#ops/http/lingeringClose';

const MIB = 1024 * 1024;
let server: Server;

afterEach(() => new Promise((closed) => server.close(closed).closeAllConnections()));

async function listen(made: Server): Promise<void> {
  server = made;
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
}

/** Begins an upload and reads nothing yet. */
async function begin(more: string): Promise<Socket> {
  const { port } = server.address() as AddressInfo;
  // One that goes on sending when the other end was closed.
  const socket = connect({ port, host: '127.0.0.1', allowHalfOpen: true }).pause();
  await once(socket, 'connect');
  socket.on('error', () => undefined);
  socket.write(`POST /api/v1/networks/merrow/imports HTTP/1.1\r\nHost: bittern.example\r\n${more}\r\n\r\n`);
  return socket;
}

/** Sends and waits until everything is out; false: the connection broke. */
const sendAll = (socket: Socket, bytes: Buffer) =>
  new Promise<boolean>((over) => socket.write(bytes, (error) => over(!error)));

async function answerTo(socket: Socket): Promise<string> {
  let text = '';
  socket.setEncoding('utf8').on('data', (chunk: string) => (text += chunk));
  const closed = new Promise((over) => socket.once('close', over));
  socket.resume();
  await closed;
  return text;
}

const front = () =>
  makeFront((() => undefined) as never, {
    allowedHosts: ['bittern.example'],
    trustedProxies: 0,
    origin: 'http://bittern.example',
    importMostBytes: 10 * MIB,
  });

test('who sends a body to its end before reading hears that its length was refused', async () => {
  await listen(createServer(front()));
  const socket = await begin(`Content-Length: ${12 * MIB}`);
  expect(await sendAll(socket, Buffer.alloc(12 * MIB))).toBe(true);
  const answer = await answerTo(socket.on('end', () => socket.end()));
  expect(answer).toContain('HTTP/1.1 413');
  expect(answer).toContain('too-large');
});

const refusing = (bounds: { longestMs: number; mostBytes: number }) =>
  createServer((request, response) => {
    closeLingering(request, bounds);
    response.writeHead(413, { Connection: 'close' }).end('refused');
  });

test('who only dribbles is let go after the time', async () => {
  await listen(refusing({ longestMs: 200, mostBytes: MIB }));
  const socket = await begin(`Content-Length: ${MIB}`);
  const startedMs = Date.now();
  const dribble = setInterval(() => socket.write(' '), 20);
  await answerTo(socket);
  clearInterval(dribble);
  expect(Date.now() - startedMs).toBeGreaterThanOrEqual(200);
  expect(Date.now() - startedMs).toBeLessThan(2_000);
});

test('who sends without end is let go after the amount', async () => {
  await listen(refusing({ longestMs: 60_000, mostBytes: 8 * MIB }));
  const socket = await begin(`Content-Length: ${1024 * MIB}`);
  let isOut = true;
  for (let sent = 0; isOut && sent < 1024; sent += 1) isOut = await sendAll(socket, Buffer.alloc(MIB));
  expect(isOut).toBe(false);
});
