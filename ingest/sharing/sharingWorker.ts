import { randomUUID } from 'node:crypto';
import { hostname } from 'node:os';
import type { Buckets } from '#db/queries/onlyBuckets';
import { noteBuckets, removeWorker, seeWorker, WORKER_DEAD_AFTER_SEC } from '#db/queries/workers';
import { log } from '#lib/config/log';
import { LeaseHolder } from './leaseHolder';
import { bucketsOfWorker } from './shareOut';

const REFRESH_MS = 10_000;

/**
 * One of the workers that share the work: some of it by buckets of stations, which go to whoever lives, the rest by leases. What two do at
 * once while they do not know of each other yet is the same in the database.
 */
export class SharingWorker {
  readonly id = randomUUID();
  readonly leases = new LeaseHolder(this.id);
  private readonly name = `${hostname()}:${process.pid}`.slice(0, 120);
  private own: readonly number[] = [];
  private seenAt = -Infinity;
  private timer: NodeJS.Timeout | undefined;

  /** The buckets whose stations are this one's to compute; none while others must take it for dead. */
  get buckets(): Exclude<Buckets, null> {
    return performance.now() - this.seenAt < WORKER_DEAD_AFTER_SEC * 1000 ? this.own : [];
  }

  /** Tells the others that it lives, from now on. */
  async join(): Promise<void> {
    this.timer = setInterval(() => void this.refresh(), REFRESH_MS).unref();
    await this.refresh();
  }

  /** Says that it lives and takes what falls to it; where the database is away, it is tried again later. */
  async refresh(): Promise<void> {
    const askedAt = performance.now();
    try {
      const own = bucketsOfWorker(this.id, await seeWorker(this.id, this.name));
      if (own.join() !== this.own.join() || this.seenAt === -Infinity) {
        await noteBuckets(this.id, own);
        log().info({ buckets: own.length }, 'worker has its share of stations');
      }
      this.own = own;
      this.seenAt = askedAt;
    } catch (error) {
      log().warn({ err: error }, 'worker could not say that it lives; tried again soon');
    }
  }

  /** Gives everything to the others. */
  async leave(): Promise<void> {
    clearInterval(this.timer);
    this.seenAt = -Infinity;
    await removeWorker(this.id).catch(() => undefined);
  }
}
