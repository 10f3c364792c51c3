/**
 * Repeatable noise: the same seed and position always give the same value, so a simulated monitor can produce any
 * interval of the past again.
 */

/** A value in [0, 1) for a whole-number position. */
export function unitNoise(seed: number, position: number): number {
  let hash = Math.imul(seed ^ 0x9e3779b9, 0x85ebca6b) ^ Math.imul(position | 0, 0xc2b2ae35);
  hash = Math.imul(hash ^ (hash >>> 15), 0x2c1b3c6d);
  hash = Math.imul(hash ^ (hash >>> 12), 0x297a2d39);
  hash ^= hash >>> 15;
  return (hash >>> 0) / 4_294_967_296;
}

/** Roughly normal, mean 0 and standard deviation 1, for a whole-number position. */
export function normalNoise(seed: number, position: number): number {
  const sum =
    unitNoise(seed, position) + unitNoise(seed + 7919, position) + unitNoise(seed + 104_729, position);
  return (sum - 1.5) * 2;
}

/** Smooth in time, between −1 and 1, with features about `scaleSec` long. */
export function smoothNoise(seed: number, epochSec: number, scaleSec: number): number {
  const position = epochSec / scaleSec;
  const step = Math.floor(position);
  const within = position - step;
  const eased = within * within * (3 - 2 * within);
  return 2 * (unitNoise(seed, step) * (1 - eased) + unitNoise(seed, step + 1) * eased) - 1;
}
