/** Stretches of time that a station's intervals occupy: disjoint, half-open, found fast. */
export class Occupied {
  private readonly starts: number[] = [];
  private readonly ends: number[] = [];

  /** Whether `fromSec <= t < toSec` touches a stretch. */
  overlaps(fromSec: number, toSec: number): boolean {
    const at = this.firstEndingAfter(fromSec);
    const start = this.starts[at];
    return start !== undefined && start < toSec;
  }

  /** Adds a stretch that overlaps none. */
  add(fromSec: number, toSec: number): void {
    const at = this.firstEndingAfter(fromSec);
    this.starts.splice(at, 0, fromSec);
    this.ends.splice(at, 0, toSec);
  }

  private firstEndingAfter(sec: number): number {
    let low = 0;
    let high = this.ends.length;
    while (low < high) {
      const middle = (low + high) >>> 1;
      if ((this.ends[middle] ?? Infinity) <= sec) low = middle + 1;
      else high = middle;
    }
    return low;
  }
}
