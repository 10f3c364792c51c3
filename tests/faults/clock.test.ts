import { beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { readiness } from '#lib/services/operation/readiness';
import { restingSubjects } from '#ingest/jobs/alone';
import { runDueSlots } from '#ingest/jobs/slots';
import { noteJobTrouble } from '#db/queries/jobTroubles';
import { useFreshSchema } from '../integration/support/freshSchema';

/** The worker's clock jumps: every job goes on by the new time at once, in both directions. Mail: smtp.test.ts. */
useFreshSchema();

const HOUR_MS = 3_600_000;
const NOW = new Date('2026-03-03T12:00:30Z');
const after = (ms: number) => new Date(NOW.getTime() + ms);
let runs: string[];
const jobs = [
  { name: 'hourly', slotMinutes: 60, run: async (now: Date) => (runs.push(now.toISOString()), 'done') },
];

beforeEach(async () => {
  runs = [];
  await db()('job_runs').delete();
  await db()('job_troubles').delete();
});

test('a clock that goes ahead a day and back: each slot is run once, and the next one on time', async () => {
  const moments = [0, 24 * HOUR_MS, 1000, HOUR_MS, 2 * HOUR_MS, 24 * HOUR_MS, 25 * HOUR_MS].map(after);
  for (const moment of moments) await runDueSlots(jobs, moment);
  const slots = [0, 24, 1, 2, 25].map((hours) => after(hours * HOUR_MS).toISOString());
  expect(runs).toEqual(slots);
});

test('a clock that goes back two hours: slots that were run are not run again', async () => {
  for (const hours of [0, 1, -1, 0, 1, 2]) await runDueSlots(jobs, after(hours * HOUR_MS));
  expect(runs).toEqual([0, 1, -1, 2].map((hours) => after(hours * HOUR_MS).toISOString()));
});

test('a worker that died while its clock was ahead is not taken for alive', async () => {
  const now = new Date();
  await db()('job_runs').insert({
    job: 'tick',
    slot: now,
    started_at: new Date(now.getTime() + 24 * HOUR_MS),
  });
  expect((await readiness(now)).isReady).toBe(false);
  await db()('job_runs').insert({
    job: 'tick',
    slot: new Date(0),
    started_at: new Date(now.getTime() - 30_000),
  });
  expect((await readiness(now)).isReady).toBe(true);
});

test('what failed while the clock was ahead is tried again now, not then', async () => {
  const trouble = { job: 'j', subject: 's', networkId: null, failure: 'f', lastAt: after(24 * HOUR_MS) };
  await noteJobTrouble({ ...trouble, restsUntil: after(24.5 * HOUR_MS) });
  expect(await restingSubjects('j', NOW)).toEqual([]);
  expect(await restingSubjects('j', after(24 * HOUR_MS))).toEqual(['s']);
});
