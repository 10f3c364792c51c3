import { expect } from 'vitest';
import { flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { present } from './fixtures';
import { type LondonMinute } from './london';
import { type ByPercent } from './londonExpected';

/** A minute of the London set as its monitor posts it, with its lowest `bandCount` thirds from 20 Hz. */
export function recordOf({ startSec, interval, flags, windSpeedMs }: LondonMinute, bandCount = 31) {
  return {
    start: formatInstantUtc(startSec),
    seconds: 60,
    LAeq: interval.laeqCentiDb / 100,
    LAFmax: present(interval.lafmaxCentiDb) / 100,
    levels: Array.from(interval.levelsCentiDb.subarray(0, bandCount), (centiDb) => centiDb / 100),
    flags: flagNames(flags),
    windSpeed: windSpeedMs,
  };
}

/** A level that comes out of a mistake of the field must not come out here; the nearest of them is 0.003 dB off. */
export function expectNot(
  actual: number | null | undefined,
  wrong: number | undefined,
  mistake: string,
): void {
  expect(Math.abs(present(actual, mistake) - present(wrong, mistake)), mistake).toBeGreaterThan(0.002);
}

/** Expects the exceedance levels that the fixture gives, to the tenth. */
export function expectLan(LAN: Record<string, number | null>, wanted: ByPercent, what: string): void {
  for (const [name, level] of Object.entries(wanted)) {
    expect(LAN[name.slice(1)], `${what} ${name}`).toBe(level);
  }
}
