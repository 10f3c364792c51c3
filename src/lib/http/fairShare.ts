/** Why there is no room: the key has as many under way as it may, or all together have, or waiting took too long. */
export type NoRoomReason = 'own' | 'all' | 'waited';

export class NoRoom extends Error {
  constructor(readonly reason: NoRoomReason) {
    super(`No room: ${reason}`);
    this.name = 'NoRoom';
  }
}

interface Bounds {
  /** How many turns are taken at once: by all, by one key. */
  turnsAtOnce: number;
  turnsOfKey: number;
  /** How many may be under way, in their turn or before it: of one key, of all. */
  mostOfKey: number;
  mostOfAll: number;
  longestWaitMs: number;
}

/** Waits for the turn, does something in it and hands it on. @throws {NoRoom} when it does not come in time. */
export type TakeTurn = <T>(inTurn: () => Promise<T>) => Promise<T>;

/**
 * Shares something scarce among keys: whoever is under way waits for its turn, and turns go round from key to key, so that one that
 * asks for a thousand waits for itself and not the others for it.
 */
export class FairShare {
  private readonly underWay = new Counts();
  private readonly inTurn = new Counts();
  /** Who waits, the key first that has waited longest since its last turn. */
  private readonly waiting = new Map<string, (() => void)[]>();

  constructor(private readonly bounds: Bounds) {}

  /** Runs `work` as one of a key; it takes its turn by calling what it is given. @throws {NoRoom} */
  async enter<T>(key: string, work: (takeTurn: TakeTurn) => Promise<T>): Promise<T> {
    if (this.underWay.of(key) >= this.bounds.mostOfKey) throw new NoRoom('own');
    if (this.underWay.total >= this.bounds.mostOfAll) throw new NoRoom('all');
    this.underWay.add(key, 1);
    try {
      return await work((inTurn) => this.takeTurn(key, inTurn));
    } finally {
      this.underWay.add(key, -1);
    }
  }

  private async takeTurn<T>(key: string, inTurn: () => Promise<T>): Promise<T> {
    await this.untilCalled(key);
    try {
      return await inTurn();
    } finally {
      this.inTurn.add(key, -1);
      this.callNext();
    }
  }

  private untilCalled(key: string): Promise<void> {
    return new Promise((resolve, reject) => {
      const call = () => {
        clearTimeout(timer);
        resolve();
      };
      const timer = setTimeout(() => {
        this.forget(key, call);
        reject(new NoRoom('waited'));
      }, this.bounds.longestWaitMs);
      this.waiting.set(key, [...(this.waiting.get(key) ?? []), call]);
      this.callNext();
    });
  }

  private callNext(): void {
    for (const [key, [call, ...later]] of this.waiting) {
      if (this.inTurn.total >= this.bounds.turnsAtOnce) return;
      if (!call || this.inTurn.of(key) >= this.bounds.turnsOfKey) continue;
      this.inTurn.add(key, 1);
      // The key goes to the end of the round.
      this.waiting.delete(key);
      if (later.length > 0) this.waiting.set(key, later);
      call();
    }
  }

  private forget(key: string, call: () => void): void {
    const others = (this.waiting.get(key) ?? []).filter((other) => other !== call);
    if (others.length > 0) this.waiting.set(key, others);
    else this.waiting.delete(key);
  }
}

/** How many of each key, and in all; a key with none is forgotten. */
class Counts {
  private readonly ofKeys = new Map<string, number>();
  total = 0;

  of(key: string): number {
    return this.ofKeys.get(key) ?? 0;
  }

  add(key: string, difference: number): void {
    this.total += difference;
    const count = this.of(key) + difference;
    if (count > 0) this.ofKeys.set(key, count);
    else this.ofKeys.delete(key);
  }
}
