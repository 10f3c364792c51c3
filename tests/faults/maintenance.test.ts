import { createServer, type Server } from 'node:http';
import { readFileSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { migrateUp } from '#db/migrateUp';
import { behindGate, type Gate } from '#ops/http/maintenance';
import { pageWhileUpgrading } from '#ops/start/pageWhileUpgrading';
import { useEmptyDatabase } from './support/emptyDatabase';

useEmptyDatabase();

/** What the web answers while the database is brought up to date: without asking it anything. */
const gate: Gate = { isOpen: false };
let server: Server;
let origin: string;

beforeAll(async () => {
  server = createServer(behindGate((_request, response) => response.writeHead(204).end(), gate));
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
});

afterAll(() => void server.close());

test('people get a plain page that says when to come again', async () => {
  const response = await fetch(`${origin}/n/merrow/map`, { headers: { accept: 'text/html' } });
  expect(response.status).toBe(503);
  expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0);
  const page = await response.text();
  expect(page).toContain('Bittern is being brought up to date');
  expect(page).not.toMatch(/<script|<link|src=/);
});

test('a monitor’s post gets 503 with Retry-After, however large, and so keeps its copy', async () => {
  const response = await fetch(`${origin}/api/v1/intervals`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ intervals: 'x'.repeat(2_000_000) }),
  });
  expect(response.status).toBe(503);
  expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0);
  expect(response.headers.get('content-type')).toBe('application/problem+json');
  expect(await response.json()).toMatchObject({ status: 503, code: 'being-updated' });
});

test('the process is alive and not ready; once it is, everything passes', async () => {
  expect((await fetch(`${origin}/healthz`)).status).toBe(200);
  const ready = await fetch(`${origin}/readyz`);
  expect([ready.status, await ready.json()]).toMatchObject([503, { migrations: 'pending' }]);
  gate.isOpen = true;
  expect((await fetch(`${origin}/n/merrow/map`)).status).toBe(204);
});

test('while an upgrade migrates the page shows; a new database, and one that is current, have none', async () => {
  const { port } = server.address() as AddressInfo;
  await new Promise((closed) => server.close(closed).closeAllConnections());
  const asks = () =>
    fetch(`${origin}/n/merrow/map`).then(
      ({ status }) => status,
      () => null,
    );

  const endOfNew = await pageWhileUpgrading({ host: '127.0.0.1', port });
  expect(await asks()).toBeNull();
  await endOfNew();

  const [{ added }] = JSON.parse(readFileSync('tests/fixtures/schemas/landed.json', 'utf8'));
  await migrateUp(added);
  const end = await pageWhileUpgrading({ host: '127.0.0.1', port });
  const heard: (number | null)[] = [];
  const migrating = migrateUp().then(() => 'done');
  while ((await Promise.race([migrating, asks().then((status) => heard.push(status))])) !== 'done');
  expect(heard.length).toBeGreaterThan(3);
  expect(new Set(heard)).toEqual(new Set([503]));
  await end();
  expect(await asks()).toBeNull();

  await (
    await pageWhileUpgrading({ host: '127.0.0.1', port })
  )();
  expect(await asks()).toBeNull();
});
