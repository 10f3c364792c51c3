import type { EventEmitter } from 'node:events';

/** A request counts so long at most: a download that lasts, or a page that listens, does not hold monitors up for ever. */
const COUNTED_MS = 2_000;

/** How many requests of people (everything but posts of monitors) are under way. */
export class PeopleUnderWay {
  count = 0;
  private whenNobody: () => void = () => undefined;

  /** Calls this whenever the last of them has been answered. */
  onNobody(call: () => void): void {
    this.whenNobody = call;
  }

  /** Counts a request from now until its answer is out. */
  note(response: EventEmitter): void {
    this.count += 1;
    let isOver = false;
    const over = () => {
      if (isOver) return;
      isOver = true;
      clearTimeout(timer);
      this.count -= 1;
      if (this.count === 0) this.whenNobody();
    };
    const timer = setTimeout(over, COUNTED_MS);
    timer.unref();
    response.once('close', over);
  }
}

/** Those of this process. */
export const peopleUnderWay = new PeopleUnderWay();
