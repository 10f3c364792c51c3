import { describe, expect, test } from 'vitest';
import { bandRange } from '#lib/acoustics/bands';
import { consistencyOf } from '#lib/acoustics/consistency';
import { laeqFromBandsDb } from '#lib/acoustics/laeqFromBands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { levelFromBandsDb } from '#lib/acoustics/weighting';

function flat(fraction: 1 | 3, firstHz: number, lastHz: number) {
  const bands = bandRange(fraction, firstHz, lastHz);
  return {
    bands,
    indices: Int8Array.from(bands, (band) => band.index),
    levels: Int16Array.from(bands, () => 5000),
  };
}

describe('LAeq from bands', () => {
  test.each([
    [3, 50, 8000],
    [3, 12.5, 20000],
    [1, 63, 8000],
  ] as const)('fraction %d, %d–%d Hz: the A-weighted sum of every band', (fraction, firstHz, lastHz) => {
    const { bands, indices, levels } = flat(fraction, firstHz, lastHz);
    const wanted = levelFromBandsDb(
      bands.map(() => 50),
      bands,
      'A',
    );
    expect(laeqFromBandsDb(fraction, levels, indices)).toBeCloseTo(wanted ?? NaN, 9);
  });

  test.each([
    [3, 63, 8000],
    [3, 50, 6300],
    [1, 125, 8000],
    [1, 63, 4000],
  ] as const)('fraction %d, %d–%d Hz is too little', (fraction, firstHz, lastHz) => {
    const { indices, levels } = flat(fraction, firstHz, lastHz);
    expect(laeqFromBandsDb(fraction, levels, indices)).toBeNull();
    expect(consistencyOf(5000, fraction, levels, indices)).toEqual({ kind: 'not-comparable' });
  });

  test('a needed band without a level leaves none; one outside the range does not', () => {
    const { indices, levels } = flat(3, 25, 8000);
    levels[0] = NO_LEVEL_CENTI_DB;
    expect(laeqFromBandsDb(3, levels, indices)).not.toBeNull();
    levels[10] = NO_LEVEL_CENTI_DB;
    expect(laeqFromBandsDb(3, levels, indices)).toBeNull();
  });
});

test('more than 1.0 dB apart, on tenths and in either direction, is inconsistent', () => {
  const { indices, levels } = flat(3, 50, 8000);
  const fromBandsCentiDb = Math.round((laeqFromBandsDb(3, levels, indices) ?? NaN) * 100);
  const kindAt = (offCentiDb: number) =>
    consistencyOf(fromBandsCentiDb + offCentiDb, 3, levels, indices).kind;
  expect([-120, -90, 0, 90, 120].map(kindAt)).toEqual([
    'inconsistent',
    'consistent',
    'consistent',
    'consistent',
    'inconsistent',
  ]);
});
