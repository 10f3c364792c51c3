import { expect, test } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import { spectralLikeness } from '#lib/acoustics/likeness';
import { aWeightOfBandDb } from '#lib/acoustics/weighting';

const shape = bandsOf(3).map((band, i) => 50 + 10 * Math.sin(i) - Math.abs(band.index));

test('the same shape, louder, is alike', () => {
  expect(
    spectralLikeness(
      shape,
      shape.map((levelDb) => levelDb + 12),
    ),
  ).toEqual({
    rmsDb: expect.closeTo(0, 9),
    sharedBands: 33,
  });
});

test('every other band 2 dB up and down differs by 2 dB', () => {
  const other = shape.slice(0, 32).map((levelDb, i) => levelDb + (i % 2 === 0 ? 2 : -2));
  expect(spectralLikeness(shape, other)).toEqual({ rmsDb: expect.closeTo(2, 9), sharedBands: 32 });
});

test('A-weighted levels give the same answer, as the definition has it', () => {
  const other = shape.map((levelDb, i) => levelDb + (i % 5));
  const weighted = (levels: number[]) => levels.map((levelDb, slot) => levelDb + aWeightOfBandDb(slot - 19));
  const plain = spectralLikeness(shape, other);
  expect(plain?.rmsDb).toBeGreaterThan(1);
  expect(spectralLikeness(weighted(shape), weighted(other))?.rmsDb).toBeCloseTo(plain?.rmsDb ?? NaN, 9);
});

test('fewer than 12 thirds in common are not compared', () => {
  const only = (count: number) => shape.map((levelDb, slot) => (slot < count ? levelDb : null));
  expect(spectralLikeness(shape, only(11))).toBeNull();
  expect(spectralLikeness(only(12), shape)?.sharedBands).toBe(12);
});
