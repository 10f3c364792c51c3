/** Numbers that look random and are the same for the same seed (mulberry32). */
export class Random {
  #state: number;

  constructor(seed: number) {
    this.#state = seed >>> 0;
  }

  /** From 0 to below 1. */
  next(): number {
    this.#state = (this.#state + 0x6d2b79f5) >>> 0;
    let mixed = this.#state;
    mixed = Math.imul(mixed ^ (mixed >>> 15), mixed | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  }

  /** A number between two, the higher one excluded. */
  between(lowest: number, highest: number): number {
    return lowest + this.next() * (highest - lowest);
  }

  /** A whole number from `lowest` to `highest`, both included. */
  whole(lowest: number, highest: number): number {
    return Math.floor(this.between(lowest, highest + 1));
  }

  isBelow(probability: number): boolean {
    return this.next() < probability;
  }

  oneOf<T>(values: readonly [T, ...T[]]): T {
    return values[this.whole(0, values.length - 1)] ?? values[0];
  }
}
