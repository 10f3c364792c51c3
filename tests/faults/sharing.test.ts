import { setTimeout as sleep } from 'node:timers/promises';
import { afterEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { listWorkers } from '#db/queries/workers';
import { aggregate } from '#ingest/jobs/aggregate';
import { runLoop } from '#ingest/jobs/loop';
import { LeaseHolder } from '#ingest/sharing/leaseHolder';
import { SharingWorker } from '#ingest/sharing/sharingWorker';
import { workersAtWork } from '#lib/services/operation/workers';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makeNetwork, makeStation } from '../integration/support/people';
import { runScript } from './support/scriptProcess';

/** Workers that share: leases, buckets of stations, and what happens when one is killed. */
useFreshSchema();

const QUARTER_SEC = 1_780_272_000;
const TAKEN_OVER_WITHIN_MS = 60_000;
const workers: SharingWorker[] = [];

afterEach(async () => {
  for (const worker of workers.splice(0)) await worker.leave();
  await db()('leases').delete();
});

async function join(): Promise<SharingWorker> {
  const worker = new SharingWorker();
  workers.push(worker);
  await worker.join();
  for (const each of workers) await each.refresh();
  return worker;
}

const sorted = (values: readonly number[]) => [...values].sort((a, b) => a - b);
const ALL = Array.from({ length: 64 }, (_, bucket) => bucket);

test('a lease is held by one of those who ask at once, and by nobody twice', async () => {
  const holders = Array.from({ length: 5 }, () => new LeaseHolder());
  for (let round = 0; round < 10; round += 1) {
    const name = `race ${round}`;
    const taken = await Promise.all(holders.map((holder) => holder.take(name)));
    expect(taken.filter(Boolean)).toHaveLength(1);
    const winner = holders[taken.indexOf(true)] as LeaseHolder;
    expect(await winner.take(name)).toBe(false);
    await winner.free(name);
    expect(await (holders[0] as LeaseHolder).take(name)).toBe(true);
    await holders[0]?.free(name);
  }
});

test('a lease that was not renewed is anyone’s, as is one that a clock far ahead gave', async () => {
  const [first, second] = [new LeaseHolder(), new LeaseHolder()];
  for (const offsetSec of [-1, 3600]) {
    expect(await first.take('late')).toBe(true);
    expect(await second.take('late')).toBe(false);
    await db().raw('UPDATE leases SET expires_at = UNIX_TIMESTAMP() + ?', [offsetSec]);
    expect(await second.take('late')).toBe(true);
    await first.free('late');
    expect(await db()('leases').pluck('holder'), 'who lost it takes it from nobody').toEqual([second.id]);
    await second.free('late');
  }
});

test('work under a lease runs once at a time, and the lease is free after it failed', async () => {
  const [first, second] = [new LeaseHolder(), new LeaseHolder()];
  const ran = await first.during('work', async () => {
    expect(await second.during('work', async () => undefined)).toBe(false);
  });
  expect(ran).toBe(true);
  await expect(first.during('work', () => Promise.reject(new Error('broken')))).rejects.toThrow('broken');
  expect(await second.during('work', async () => undefined)).toBe(true);
});

test('a loop of one worker runs at one of two, and its lease ends with it', async () => {
  const [first, second] = [await join(), await join()];
  const stop = new AbortController();
  const rounds = { first: 0, second: 0 };
  const loop = (who: keyof typeof rounds) => ({
    name: 'alternately',
    everySec: 0.02,
    work: async () => {
      rounds[who] += 1;
      return 0;
    },
  });
  const loops = [runLoop(loop('first'), stop.signal, first), runLoop(loop('second'), stop.signal, second)];
  await sleep(500);
  const [one, other] = sorted([rounds.first, rounds.second]);
  expect(one).toBe(0);
  expect(other).toBeGreaterThan(2);
  stop.abort();
  await Promise.all(loops);
  expect(await db()('leases')).toEqual([]);
});

test('one, two and three workers have all stations between them, none twice; who leaves gives its own at once', async () => {
  const first = await join();
  expect(first.buckets).toEqual(ALL);
  const second = await join();
  const third = await join();
  expect(sorted([first, second, third].flatMap(({ buckets }) => buckets))).toEqual(ALL);
  const kept = first.buckets;
  await second.leave();
  await Promise.all([first.refresh(), third.refresh()]);
  expect(sorted([...first.buckets, ...third.buckets])).toEqual(ALL);
  expect(first.buckets).toEqual(expect.arrayContaining([...kept]));
  expect(second.buckets).toEqual([]);
  expect((await listWorkers()).map(({ id, buckets }) => [id, buckets])).toEqual(
    expect.arrayContaining([
      [first.id, first.buckets],
      [third.id, third.buckets],
    ]),
  );
});

test('each worker recomputes its own stations’ quarter-hours alone', async () => {
  const [first, second] = [await join(), await join()];
  const networkId = await makeNetwork('shared');
  for (let at = 0; at < 12; at += 1) {
    const stationId = await makeStation(networkId, `S-${at}`);
    await db()('dirty_marks').insert({ station_id: stationId, quarter_starts_at: QUARTER_SEC, marked_at: 0 });
  }
  const waiting = () => db()('dirty_marks').pluck('station_id') as Promise<number[]>;
  const all = await waiting();
  const ofFirst = all.filter((id) => first.buckets.includes(id % 64));
  await aggregate(first.buckets);
  expect(sorted(await waiting())).toEqual(sorted(all.filter((id) => !ofFirst.includes(id))));
  await aggregate(second.buckets);
  expect(await waiting()).toEqual([]);
});

test('what a killed worker had, leases and stations, is taken over within a minute', async () => {
  const victim = runScript('tests/faults/support/workUntilKilled.ts');
  for (let wait = 0; wait < 300 && !/holds|does not/.test(victim.output()); wait += 1) await sleep(100);
  expect(victim.output()).toContain('holds');
  const heir = await join();
  expect(heir.buckets.length).toBeLessThan(64);
  expect(await heir.leases.take('killed')).toBe(false);
  victim.kill('SIGKILL');
  expect((await victim.ended).signal).toBe('SIGKILL');
  const killedAt = performance.now();
  while (performance.now() - killedAt < TAKEN_OVER_WITHIN_MS) {
    if ((await heir.leases.take('killed')) || heir.leases.holds('killed')) {
      if (heir.buckets.length === 64) break;
    }
    await sleep(500);
  }
  expect(heir.leases.holds('killed')).toBe(true);
  expect(heir.buckets).toEqual(ALL);
  // Both may have started within the same second, which leaves their order open.
  const atWork = await workersAtWork();
  expect(atWork.sort((a, b) => Number(a.isLiving) - Number(b.isLiving))).toEqual([
    expect.objectContaining({ isLiving: false, parts: 0, jobs: [] }),
    expect.objectContaining({ isLiving: true, parts: 64, jobs: ['killed'] }),
  ]);
});
