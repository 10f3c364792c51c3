import { randomUUID } from 'node:crypto';
import { freeLease, LEASE_SEC, renewLeases, takeLease } from '#db/queries/leases';
import { log } from '#lib/config/log';

const RENEW_MS = (LEASE_SEC / 3) * 1000;

/**
 * Holds leases and renews them until they are freed. A lease saves double work; it is not what makes the work correct: who does not get to
 * renewing may lose it without noticing at once.
 */
export class LeaseHolder {
  /** When each was renewed last, by the monotonic clock in milliseconds; null: being taken. */
  private readonly held = new Map<string, number | null>();
  private timer: NodeJS.Timeout | undefined;

  constructor(readonly id: string = randomUUID()) {}

  /** Whether this one has a lease, as far as it can know. */
  holds(name: string): boolean {
    const renewed = this.held.get(name);
    return renewed !== null && renewed !== undefined && performance.now() - renewed < LEASE_SEC * 1000;
  }

  /** Takes a lease. @returns false where anybody has it, this one included. */
  async take(name: string): Promise<boolean> {
    if (this.held.get(name) === null || this.holds(name)) return false;
    this.held.set(name, null);
    const askedAt = performance.now();
    try {
      const isTaken = await takeLease(name, this.id);
      if (isTaken) this.held.set(name, askedAt);
      return isTaken;
    } finally {
      if (this.held.get(name) === null) this.held.delete(name);
      this.keepTime();
    }
  }

  /** Gives a lease back; where the database is away, it runs out. */
  async free(name: string): Promise<void> {
    if (!this.held.delete(name)) return;
    this.keepTime();
    await freeLease(name, this.id).catch(() => undefined);
  }

  /** Runs `work` under a lease, or not at all where anybody has it. @returns whether it ran. */
  async during(name: string, work: () => Promise<void>): Promise<boolean> {
    if (!(await this.take(name))) return false;
    try {
      await work();
    } finally {
      await this.free(name);
    }
    return true;
  }

  private keepTime(): void {
    if (this.held.size === 0) {
      clearInterval(this.timer);
      this.timer = undefined;
    } else this.timer ??= setInterval(() => void this.renew(), RENEW_MS).unref();
  }

  private async renew(): Promise<void> {
    const names = [...this.held].filter(([, renewed]) => renewed !== null).map(([name]) => name);
    const askedAt = performance.now();
    try {
      const ours = new Set(await renewLeases(this.id));
      for (const name of names) {
        if (!this.held.has(name)) continue;
        if (ours.has(name)) this.held.set(name, askedAt);
        else this.lose(name);
      }
    } catch (error) {
      log().warn({ err: error }, 'leases not renewed; tried again soon');
    }
  }

  private lose(name: string): void {
    this.held.delete(name);
    this.keepTime();
    log().warn({ lease: name }, 'a lease ran out before it was renewed');
  }
}
