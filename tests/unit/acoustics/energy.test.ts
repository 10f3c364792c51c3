import { describe, expect, test } from 'vitest';
import {
  energyMeanDb,
  energyOfCentiDb,
  energyOfDb,
  energySumDb,
  levelOfEnergyDb,
} from '#lib/acoustics/energy';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';

describe('energies', () => {
  test('the table is 10^(L/10) of every storable level and of sums of three', () => {
    for (let centiDb = -3000; centiDb <= 20480; centiDb += 1) {
      const ratio = energyOfCentiDb(centiDb) / energyOfDb(centiDb / 100);
      if (!(Math.abs(ratio - 1) < 1e-12)) expect.fail(`${centiDb}: ${ratio}`);
    }
  });

  test.each([NO_LEVEL_CENTI_DB, -3001, 20481, 0.5, NaN])('%d is no stored level', (centiDb) => {
    expect(() => energyOfCentiDb(centiDb)).toThrow(RangeError);
  });

  test('nothing is null, never 0 dB', () => {
    expect(levelOfEnergyDb(0)).toBeNull();
    expect(levelOfEnergyDb(1)).toBe(0);
    expect(energySumDb([])).toBeNull();
    expect(energyMeanDb([])).toBeNull();
    expect(energyMeanDb([60, 70], [0, 0])).toBeNull();
  });

  test('what is no energy or no weight is refused', () => {
    expect(() => levelOfEnergyDb(-1)).toThrow(RangeError);
    expect(() => levelOfEnergyDb(NaN)).toThrow(RangeError);
    expect(() => energyMeanDb([60], [-1])).toThrow(RangeError);
    expect(() => energyMeanDb([60], [NaN])).toThrow(RangeError);
    expect(() => energyMeanDb([60, 61], [1])).toThrow(RangeError);
  });
});
