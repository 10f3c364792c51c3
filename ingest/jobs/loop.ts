import { setTimeout as sleep } from 'node:timers/promises';
import type { Buckets } from '#db/queries/onlyBuckets';
import { log } from '#lib/config/log';
import { bucketsByServer } from '../sharing/bucketsByServer';
import type { SharingWorker } from '../sharing/sharingWorker';

/**
 * Work that is derived from the database: does a bounded part and answers how much it did; 0 when nothing is left.
 * `buckets`: the stations that it is for, where workers share the work by them.
 */
export type Work = (now: Date, buckets: Buckets) => Promise<number>;

export interface LoopSettings {
  name: string;
  /** Seconds between rounds while nothing is left. */
  everySec: number;
  work: Work;
  /**
   * Who does it: one worker, until that ends or fails (by default); each for its own stations; or whoever holds the leases that the
   * work takes by itself, where there is something to do.
   */
  by?: 'one' | 'stations' | 'itself';
}

const AFTER_FAILURE_SEC = 5;

/**
 * Does a kind of work round by round until `signal` aborts: at once again while something is left. A failure is logged and
 * tried again, by another worker where there is one; it stops neither this loop nor the others.
 */
export async function runLoop(
  settings: LoopSettings,
  signal: AbortSignal,
  worker: SharingWorker,
): Promise<void> {
  const { name, everySec } = settings;
  while (!signal.aborted) {
    const waitSec = await round(settings, worker).then(
      (done) => (done > 0 ? 0 : everySec),
      async (error: unknown) => {
        log().error({ err: error, job: name }, 'job failed');
        await worker.leases.free(name);
        return AFTER_FAILURE_SEC;
      },
    );
    if (waitSec > 0) await sleep(waitSec * 1000, undefined, { signal }).catch(() => undefined);
  }
  await worker.leases.free(name);
}

async function round({ name, work, by = 'one' }: LoopSettings, worker: SharingWorker): Promise<number> {
  if (by === 'one' && !worker.leases.holds(name) && !(await worker.leases.take(name))) return 0;
  const done = await (by === 'stations' ? serverByServer(work, worker.buckets) : work(new Date(), null));
  if (done > 0) log().debug({ job: name, done }, 'job did');
  return done;
}

/** Does work for buckets, those of each data server by themselves: one that is away stops none of the others. @throws its failure, when the others are done. */
async function serverByServer(work: Work, buckets: readonly number[]): Promise<number> {
  if (buckets.length === 0) return 0;
  const failures: unknown[] = [];
  let done = 0;
  for (const ofServer of await bucketsByServer(buckets))
    await work(new Date(), ofServer).then(
      (more) => (done += more),
      (error: unknown) => failures.push(error),
    );
  if (failures.length > 0) throw failures[0];
  return done;
}
