import { describe, expect, test } from 'vitest';
import {
  bandAt,
  bandByNominalHz,
  bandHolding,
  bandLabel,
  bandRange,
  bandSlot,
  bandsOf,
  BAND_SLOTS,
  hasBand,
  parseBandLabel,
} from '#lib/acoustics/bands';

describe('bands', () => {
  test('octaves have the index of their middle third', () => {
    expect(bandAt(1, -3).nominalHz).toBe(500);
    expect(bandAt(3, -3).nominalHz).toBe(500);
    expect(hasBand(1, -2)).toBe(false);
    expect(hasBand(3, -2)).toBe(true);
  });

  test.each([
    [1, -2],
    [1, 15],
    [1, -21],
    [3, -20],
    [3, 14],
    [3, 0.5],
  ] as const)('fraction %d has no band %d', (fraction, index) => {
    expect(() => bandAt(fraction, index)).toThrow(RangeError);
    expect(hasBand(fraction, index)).toBe(false);
  });

  test('slots are dense from 0', () => {
    expect(bandsOf(3).map((band) => bandSlot(band.index))).toEqual(
      Array.from({ length: BAND_SLOTS }, (_, i) => i),
    );
  });

  test('ranges include both ends and refuse what is none', () => {
    expect(bandRange(3, 25, 40).map((band) => band.nominalHz)).toEqual([25, 31.5, 40]);
    expect(bandRange(1, 63, 63).map((band) => band.index)).toEqual([-12]);
    expect(() => bandRange(1, 63, 80)).toThrow(RangeError);
    expect(() => bandRange(3, 100, 50)).toThrow(RangeError);
  });

  test('the band that holds a frequency: edges belong to the upper band', () => {
    expect(bandHolding(3, 50)?.nominalHz).toBe(50);
    expect(bandHolding(3, 44.66)?.nominalHz).toBe(40);
    expect(bandHolding(3, bandAt(3, 0).upperHz)?.index).toBe(1);
    expect(bandHolding(3, 11)).toBeUndefined();
    expect(bandHolding(1, 30_000)).toBeUndefined();
  });

  test.each([
    ['3.15k', 3150],
    ['1 kHz', 1000],
    ['250', 250],
    ['250 Hz', 250],
    ['31.5', 31.5],
    ['12.5KHZ', 12500],
    ['1.25 k', 1250],
  ])('"%s" is %d Hz', (text, hz) => expect(parseBandLabel(text)).toBe(hz));

  test.each(['', 'k', 'Hz', '-5', '1e3', '1,000', 'z100', '3.15kk', 'NaN'])('"%s" is no band', (text) => {
    expect(parseBandLabel(text)).toBeUndefined();
  });

  test('every label reads back as its band', () => {
    for (const fraction of [1, 3] as const) {
      for (const band of bandsOf(fraction)) {
        expect(bandByNominalHz(fraction, parseBandLabel(bandLabel(band)) ?? NaN)).toBe(band);
      }
    }
    expect(bandLabel(bandAt(3, 5))).toBe('3.15 kHz');
  });
});
