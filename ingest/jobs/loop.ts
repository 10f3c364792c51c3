import { setTimeout as sleep } from 'node:timers/promises';
import type { Buckets } from '#db/queries/onlyBuckets';
import { log } from '#lib/config/log';
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
  if (by === 'stations' && worker.buckets.length === 0) return 0;
  const done = await work(new Date(), by === 'stations' ? worker.buckets : null);
  if (done > 0) log().debug({ job: name, done }, 'job did');
  return done;
}
