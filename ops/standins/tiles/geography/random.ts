import type { Point } from './plane';

/** A repeatable stream of numbers, 0 ≤ n < 1 (the 32-bit mix known as mulberry32): the same seed draws the same map. */
export class Dice {
  constructor(private state: number) {}

  next(): number {
    this.state = (this.state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(this.state ^ (this.state >>> 15), 1 | this.state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.next();
  }

  chance(probability: number): boolean {
    return this.next() < probability;
  }
}

function latticeValue(column: number, row: number, seed: number): number {
  let mixed = Math.imul(column, 374761393) + Math.imul(row, 668265263) + Math.imul(seed, 2147483647);
  mixed = Math.imul(mixed ^ (mixed >>> 13), 1274126177);
  return ((mixed ^ (mixed >>> 16)) >>> 0) / 2 ** 31 - 1;
}

const ease = (t: number) => t * t * (3 - 2 * t);

function valueNoise(x: number, y: number, seed: number): number {
  const column = Math.floor(x);
  const row = Math.floor(y);
  const across = ease(x - column);
  const up = ease(y - row);
  const low = latticeValue(column, row, seed) * (1 - across) + latticeValue(column + 1, row, seed) * across;
  const high =
    latticeValue(column, row + 1, seed) * (1 - across) + latticeValue(column + 1, row + 1, seed) * across;
  return low * (1 - up) + high * up;
}

/**
 * Smooth noise over the plane, about −1 to 1: `octaves` of value noise, each at half the wavelength and half the
 * height of the one before.
 */
export function noiseAt([x, y]: Point, wavelengthM: number, seed: number, octaves = 3): number {
  let sum = 0;
  let height = 1;
  let total = 0;
  for (let octave = 0; octave < octaves; octave += 1) {
    const scale = 2 ** octave / wavelengthM;
    sum += height * valueNoise(x * scale, y * scale, seed + octave * 31);
    total += height;
    height /= 2;
  }
  return sum / total;
}
