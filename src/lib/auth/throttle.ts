const MOST_KEYS = 20_000;

/** How tries are slowed down. */
export interface Pace {
  /** Tries that go through without waiting. */
  free: number;
  /** The wait after those; it doubles with each further try up to the longest. */
  firstSec: number;
  mostSec: number;
  /** After so long without a try everything is forgotten. */
  forgetSec: number;
}

interface Tries {
  count: number;
  notBeforeMs: number;
  lastMs: number;
}

/** Counts tries by key and has each wait longer than the one before. The keys used longest ago are forgotten first. */
export class Throttle {
  private readonly tries = new Map<string, Tries>();

  constructor(private readonly pace: Pace) {}

  /** Seconds until the next try of a key may go through; 0: now. */
  waitSec(key: string, nowMs: number): number {
    const known = this.known(key, nowMs);
    return known ? Math.max(0, Math.ceil((known.notBeforeMs - nowMs) / 1000)) : 0;
  }

  /** Counts a try, before it is known how it ends: tries at the same moment count, too. */
  count(key: string, nowMs: number): void {
    const count = (this.known(key, nowMs)?.count ?? 0) + 1;
    const beyond = count - this.pace.free;
    const waitSec =
      beyond < 0 ? 0 : Math.min(this.pace.mostSec, this.pace.firstSec * 2 ** Math.min(beyond, 30));
    this.keep(key, { count, notBeforeMs: nowMs + waitSec * 1000, lastMs: nowMs });
  }

  /** Takes back one try that was none of a guesser. */
  takeBack(key: string, nowMs: number): void {
    const known = this.known(key, nowMs);
    if (known) this.keep(key, { ...known, count: Math.max(0, known.count - 1), notBeforeMs: nowMs });
  }

  forget(key: string): void {
    this.tries.delete(key);
  }

  private known(key: string, nowMs: number): Tries | undefined {
    const known = this.tries.get(key);
    return known && nowMs - known.lastMs < this.pace.forgetSec * 1000 ? known : undefined;
  }

  private keep(key: string, tries: Tries): void {
    this.tries.delete(key);
    this.tries.set(key, tries);
    if (this.tries.size <= MOST_KEYS) return;
    const [first] = this.tries.keys();
    if (first !== undefined) this.tries.delete(first);
  }
}
