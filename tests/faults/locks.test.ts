import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb } from '#db/client';
import { withNamedLock } from '#db/queries/namedLock';
import { OwnServer } from './support/ownServer';

/** Named locks of jobs, whose connection is lost with the server. */
let server: OwnServer;

beforeAll(async () => {
  server = await OwnServer.start();
});

afterAll(async () => {
  await closeDb();
  await server.stop();
});

async function runs(name: string): Promise<boolean> {
  return withNamedLock(name, async () => undefined).catch(() => false);
}

test('two of a process do not hold the same lock; another name is free', async () => {
  await withNamedLock('one', async () => {
    expect(await runs('one')).toBe(false);
    expect(await runs('two')).toBe(true);
  });
  expect(await runs('one')).toBe(true);
});

test('a server that is started anew while a lock is asked for is asked again', async () => {
  const asked = Promise.all(Array.from({ length: 20 }, (_, at) => runs(`many ${at}`)));
  await server.restart();
  await asked;
  for (let wait = 0; wait < 50 && !(await runs('after')); wait += 1) await sleep(100);
  expect(await runs('after')).toBe(true);
});

test('a connection that the server kills while it waits is replaced', async () => {
  expect(await runs('before')).toBe(true);
  const others = await server.asRoot(`SELECT id FROM information_schema.processlist WHERE user = 'web'`);
  for (const { id } of others) await server.asRoot(`KILL ${Number(id)}`);
  const outcomes = [];
  for (let attempt = 0; attempt < 3; attempt += 1) outcomes.push(await runs('killed'));
  expect(outcomes.at(-1)).toBe(true);
});
