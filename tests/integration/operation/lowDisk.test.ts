import { statfs } from 'node:fs/promises';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { forecastDisk } from '#ingest/jobs/forecastDisk';
import { config } from '#lib/config/index';
import { useDataDirectory } from '../imports/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';

useDataDirectory();
useFreshSchema();

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;
const START_MS = Date.UTC(2026, 5, 1);
const addressOf = ({ userId }: { userId: string }) => `${userId.slice(0, 8)}@people.example`;
let operators: string[];

beforeAll(async () => {
  const [north, south] = [await makeNetwork('north'), await makeNetwork('south')];
  const told = [
    await makePerson(north, ['operator']),
    await makePerson(north, ['operator', 'liaison']),
    await makePerson(south, ['operator']),
  ];
  operators = told.map(addressOf).sort();
  const gone = await makePerson(north, ['operator']);
  await db()('users').where({ id: gone.userId }).update({ disabled_at: new Date() });
  await makePerson(north, ['liaison']);
  await makePerson(south, ['regulator']);
  await makePerson(null, [], true);
});

/** As if so much had been free at every earlier sample, in parts of what is free on this machine now. */
async function freeBefore(share: number): Promise<void> {
  const { bavail, bsize, blocks } = await statfs(config().dataDir);
  const totalBytes = blocks * bsize;
  const samples = Array.from({ length: 10 }, (_, day) => ({
    taken_at: new Date(START_MS - (10 - day) * DAY_MS),
    total_bytes: totalBytes,
    free_bytes: Math.round(bavail * bsize * (1 + (share - 1) * ((10 - day) / 10))),
    database_bytes: 0,
  }));
  await db()('disk_samples').insert(samples).onConflict(['taken_at']).merge(['free_bytes']);
}

const run = (hours: number) => forecastDisk(new Date(START_MS + hours * HOUR_MS));
const recipients = async () =>
  (await db()('outbox').where({ kind: 'disk' }).orderBy('id').pluck('recipient')) as string[];

test('operators are told once when room gets little, once a week while it is, and anew after there was enough', async () => {
  // Ten days ago twice as much was free: ten days more, and nothing is.
  await freeBefore(2);
  await run(0);
  expect((await recipients()).sort()).toEqual(operators);
  const { subject } = await db()('outbox').where({ kind: 'disk' }).first();
  expect(subject).toMatch(/^The disk will be full in (9|10) days$/);

  // Every hour of the next days, over the end of the calendar's week as well.
  for (let hours = 1; hours < 7 * 24; hours += 9) await run(hours);
  expect((await recipients()).length).toBe(operators.length);
  await run(7 * 24 + 1);
  expect((await recipients()).length).toBe(2 * operators.length);

  // Room again: nothing; and little room after that is told at once.
  await freeBefore(1);
  await run(7 * 24 + 2);
  expect((await recipients()).length).toBe(2 * operators.length);
  await freeBefore(2);
  await run(7 * 24 + 3);
  expect((await recipients()).length).toBe(3 * operators.length);
  await run(7 * 24 + 4);
  expect((await recipients()).length).toBe(3 * operators.length);
});
