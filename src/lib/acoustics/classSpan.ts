import { MAX_SUM_CENTI_DB, MIN_LEVEL_CENTI_DB } from './levelRange';

/** The lowest and the highest class that is kept, in tenths of a dB. */
export const LOWEST_TENTHS = MIN_LEVEL_CENTI_DB / 10;
export const HIGHEST_TENTHS = MAX_SUM_CENTI_DB / 10;
const GROWTH_CLASSES = 32;
/** Shared by all that hold nothing yet: making an array costs more than what most rows do with it. */
const NO_CLASSES = new Float64Array(0);

/** Seconds of consecutive classes of 0.1 dB, as many as have been asked for: `secs[i]` in the class `firstTenths + i`. */
export class ClassSpan {
  firstTenths = 0;
  secs = NO_CLASSES;

  /**
   * Makes the span reach from one class to another, with some to spare on a side where it grows.
   * @throws RangeError for classes outside the stored range of levels.
   */
  cover(lowestTenths: number, highestTenths: number): void {
    const { firstTenths, secs } = this;
    const end = firstTenths + secs.length;
    if (firstTenths <= lowestTenths && highestTenths < end) return;
    if (!(LOWEST_TENTHS <= lowestTenths && highestTenths <= HIGHEST_TENTHS)) {
      throw new RangeError(
        `${lowestTenths} to ${highestTenths} tenths of a dB leave the stored range of levels.`,
      );
    }
    const isEmpty = secs.length === 0;
    // At least twice as long, because every new array costs more than a day's samples in it.
    const growth = Math.max(GROWTH_CLASSES, secs.length);
    const from =
      isEmpty || lowestTenths < firstTenths ? Math.max(LOWEST_TENTHS, lowestTenths - growth) : firstTenths;
    const to = isEmpty || highestTenths >= end ? Math.min(HIGHEST_TENTHS, highestTenths + growth) + 1 : end;
    this.secs = new Float64Array(to - from);
    this.secs.set(secs, isEmpty ? 0 : firstTenths - from);
    this.firstTenths = from;
  }
}
