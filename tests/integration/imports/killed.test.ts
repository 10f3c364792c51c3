import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as sleep } from 'node:timers/promises';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { importsOf, storedRows, useDataDirectory, work } from './support';

useDataDirectory();
useFreshSchema();

const ROWS = 9000;
const FIRST_SEC = Date.UTC(2026, 0, 1) / 1000;
const WORKER = `
  const { advanceImports } = await import('#ingest/imports/advance');
  process.send('ready');
  for (;;) if ((await advanceImports()) === 0) await new Promise((resolve) => setTimeout(resolve, 20));
`;
let session: string;
let stationId: number;

beforeAll(async () => {
  const networkId = await makeNetwork('quay');
  session = (await makePerson(networkId, ['operator'])).session;
  stationId = await makeStation(networkId, 'QY-1');
});

/** Runs a worker's process and kills it outright `afterMs` after it has begun. */
async function killedAfter(afterMs: number): Promise<void> {
  const child = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', WORKER], {
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    env: process.env,
  });
  await once(child, 'message');
  await sleep(afterMs);
  child.kill('SIGKILL');
  await once(child, 'exit');
}

test('an import whose worker is killed again and again holds every row once', async () => {
  const imports = importsOf('quay', () => session);
  const line = (at: number) =>
    `${new Date((FIRST_SEC + at) * 1000).toISOString().replace('.000', '')},1,${40 + (at % 400) / 10}`;
  const text = ['start,seconds,LAeq', ...Array.from({ length: ROWS }, (_, at) => line(at)), ''].join('\n');
  const { id } = await imports.upload('QY-1', text);
  await imports.map(id, {
    delimiter: ',',
    decimal: '.',
    columns: ['start', 'seconds', 'LAeq'],
  });
  await killedAfter(150);
  await work();
  expect((await imports.read(id)).report).toMatchObject({ rows: ROWS, accepted: ROWS });
  await imports.act(id, 'store');
  await killedAfter(60);
  const half = await storedRows(stationId);
  const left = await db()('import_intervals').where({ import_id: id }).count({ count: '*' }).first();
  expect(half.length + Number(left?.count)).toBe(ROWS);
  await work();
  expect(await storedRows(stationId)).toHaveLength(ROWS);
  expect(await imports.read(id)).toMatchObject({ state: 'stored', stored: ROWS, knownMeanwhile: 0 });
  await imports.act(id, 'undo', 'A trial.');
  await killedAfter(60);
  await work();
  expect(await storedRows(stationId)).toEqual([]);
  expect(await imports.read(id)).toMatchObject({ state: 'undone', stored: 0 });
  await imports.act(id, 'redo');
  await killedAfter(60);
  await work();
  expect(await imports.read(id)).toMatchObject({ state: 'stored', stored: ROWS });
  expect(await storedRows(stationId)).toHaveLength(ROWS);
  await imports.act(id, 'undo', 'A trial.');
  await work();
  await imports.act(id, 'discard');
  await killedAfter(30);
  await work();
  expect(await imports.read(id)).toMatchObject({ state: 'discarded' });
  expect(await db()('import_intervals').where({ import_id: id })).toEqual([]);
});
