import { setTimeout as sleep } from 'node:timers/promises';
import { withNamedLock } from '#db/queries/namedLock';
import { log } from '#lib/config/log';

/** Work that is derived from the database: does a bounded part and answers how much it did; 0 when nothing is left. */
export type Work = (now: Date) => Promise<number>;

export interface LoopSettings {
  name: string;
  /** Seconds between rounds while nothing is left. */
  everySec: number;
  work: Work;
  /** It takes locks of its own, where there is something to do: a lock for the round would hold a connection of the pool for nothing. */
  locksItself?: true;
}

const AFTER_FAILURE_SEC = 5;

/**
 * Does a kind of work round by round until `signal` aborts: at once again while something is left. A failure is logged and
 * tried again; it stops neither this loop nor the others.
 */
export async function runLoop(
  { name, everySec, work, locksItself }: LoopSettings,
  signal: AbortSignal,
): Promise<void> {
  while (!signal.aborted) {
    const waitSec = await round(name, work, locksItself === true).then(
      (done) => (done > 0 ? 0 : everySec),
      (error: unknown) => {
        log().error({ err: error, job: name }, 'job failed');
        return AFTER_FAILURE_SEC;
      },
    );
    if (waitSec > 0) await sleep(waitSec * 1000, undefined, { signal }).catch(() => undefined);
  }
}

async function round(name: string, work: Work, locksItself: boolean): Promise<number> {
  let done = 0;
  const once = async () => {
    done = await work(new Date());
  };
  if (locksItself) await once();
  else await withNamedLock(name, once);
  if (done > 0) log().debug({ job: name, done }, 'job did');
  return done;
}
