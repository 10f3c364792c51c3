import type { PeopleUnderWay } from './peopleUnderWay';

/** More large posts at once gain nothing: they share one thread here, and the database's disk. */
const MOST_LARGE = 3;
/** So long a large post waits for people who wait themselves, again and again; then one is taken beside them. */
const PAUSE_MS = 100;

/** Says when a large post lets people go first: monitors can wait, people do not like to. */
export class Courtesy {
  private lastTakenMs = -Infinity;
  private timer: NodeJS.Timeout | null = null;

  /** `goOn` is called when something that was held back may be asked for anew. */
  constructor(
    private readonly people: PeopleUnderWay,
    private readonly goOn: () => void,
  ) {
    people.onNobody(goOn);
  }

  /** Whether the next large post waits, with so many under way; if not, it is taken. */
  isHeldBack(largePosts: number): boolean {
    if (largePosts >= MOST_LARGE) return true;
    const nowMs = performance.now();
    if (this.people.count > 0 && (largePosts > 0 || nowMs - this.lastTakenMs < PAUSE_MS)) {
      this.askAgainLater();
      return true;
    }
    this.lastTakenMs = nowMs;
    return false;
  }

  private askAgainLater(): void {
    this.timer ??= setTimeout(() => {
      this.timer = null;
      this.goOn();
    }, PAUSE_MS);
  }
}
