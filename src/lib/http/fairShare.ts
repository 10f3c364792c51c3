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
  /**
   * Whether whoever takes a whole turn does not get it at the moment, with so many others in one; left out: never. What takes a part overtakes
   * it meanwhile. It is asked at every change, and when the share is told to `goOn`.
   */
  isHeldBack?(wholeTurns: number): boolean;
}

/**
 * Waits for the turn, does something in it and hands it on; `part`: how much of a turn it takes, all of it unless told otherwise.
 * @throws {NoRoom} when it does not come in time.
 */
export type TakeTurn = <T>(inTurn: () => Promise<T>, part?: number) => Promise<T>;

interface Waiting {
  part: number;
  call(): void;
}

/**
 * Shares something scarce among keys: whoever is under way waits for its turn, and turns go round from key to key, so that one that
 * asks for a thousand waits for itself and not the others for it.
 */
export class FairShare {
  private readonly underWay = new Counts();
  private readonly inTurn = new Counts();
  private wholeTurns = 0;
  /** Who waits, the key first that has waited longest since its last turn. */
  private readonly waiting = new Map<string, Waiting[]>();

  constructor(private readonly bounds: Bounds) {}

  /** Runs `work` as one of a key; it takes its turn by calling what it is given. @throws {NoRoom} */
  async enter<T>(key: string, work: (takeTurn: TakeTurn) => Promise<T>): Promise<T> {
    if (this.underWay.of(key) >= this.bounds.mostOfKey) throw new NoRoom('own');
    if (this.underWay.total >= this.bounds.mostOfAll) throw new NoRoom('all');
    this.underWay.add(key, 1);
    try {
      return await work((inTurn, part = 1) => this.takeTurn(key, inTurn, part));
    } finally {
      this.underWay.add(key, -1);
    }
  }

  private async takeTurn<T>(key: string, inTurn: () => Promise<T>, part: number): Promise<T> {
    await this.untilCalled(key, part);
    try {
      return await inTurn();
    } finally {
      this.inTurn.add(key, -part);
      if (part >= 1) this.wholeTurns -= 1;
      this.callNext();
    }
  }

  private untilCalled(key: string, part: number): Promise<void> {
    return new Promise((resolve, reject) => {
      const waiting = {
        part,
        call() {
          clearTimeout(timer);
          resolve();
        },
      };
      const timer = setTimeout(() => {
        this.forget(key, waiting);
        reject(new NoRoom('waited'));
      }, this.bounds.longestWaitMs);
      this.waiting.set(key, [...(this.waiting.get(key) ?? []), waiting]);
      this.callNext();
    });
  }

  /** Asks again who is held back. */
  goOn(): void {
    this.callNext();
  }

  private callNext(): void {
    for (const [key, [next, ...later]] of this.waiting) {
      if (this.inTurn.total >= this.bounds.turnsAtOnce) return;
      if (!next || this.inTurn.of(key) + next.part > this.bounds.turnsOfKey) continue;
      // What takes more than is left waits for it; smaller ones do not overtake it for ever.
      if (this.inTurn.total + next.part > this.bounds.turnsAtOnce) return;
      if (next.part >= 1 && this.bounds.isHeldBack?.(this.wholeTurns)) continue;
      this.inTurn.add(key, next.part);
      if (next.part >= 1) this.wholeTurns += 1;
      // The key goes to the end of the round.
      this.waiting.delete(key);
      if (later.length > 0) this.waiting.set(key, later);
      next.call();
    }
  }

  private forget(key: string, waiting: Waiting): void {
    const others = (this.waiting.get(key) ?? []).filter((other) => other !== waiting);
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
