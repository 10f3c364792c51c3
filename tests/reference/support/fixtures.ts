import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { gunzipSync } from 'node:zlib';
import { expect } from 'vitest';

const folder = new URL('../../fixtures/', import.meta.url);

function read(path: string): Buffer {
  return readFileSync(fileURLToPath(new URL(path, folder)));
}

/** A JSON fixture; its shape is what the test that reads it says. */
export function readJson<Shape>(path: string): Shape {
  return JSON.parse(read(path).toString('utf8')) as Shape;
}

/** Rows of a CSV fixture without quoted commas, gzip or not, its header line first. */
export function readCsv(path: string): string[][] {
  const bytes = path.endsWith('.gz') ? gunzipSync(read(path)) : read(path);
  const lines = bytes.toString('utf8').trimEnd().split('\n');
  return lines.map((line) => line.split(',').map((cell) => cell.replace(/^"|"$/g, '')));
}

/** An element that must be there. */
export function present<T>(value: T | null | undefined, what = 'value'): T {
  if (value === null || value === undefined) throw new Error(`The fixture has no ${what}.`);
  return value;
}

/** Expects a level within a tolerance in dB, or null where null is wanted. */
export function expectNear(
  actual: number | null,
  wanted: number | null,
  toleranceDb: number,
  what = '',
): void {
  if (actual === null || wanted === null) expect(actual, what).toBe(wanted);
  else expect(Math.abs(actual - wanted), `${what}: ${actual} for ${wanted}`).toBeLessThanOrEqual(toleranceDb);
}
