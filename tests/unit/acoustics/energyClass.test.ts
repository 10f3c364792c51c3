import fc from 'fast-check';
import { expect, test } from 'vitest';
import { tenthsOfEnergy } from '#lib/acoustics/energyClass';
import { energyOfCentiDb } from '#lib/acoustics/energy';
import { MAX_LEVEL_CENTI_DB, MIN_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { toTenths } from '#lib/acoustics/rounding';

const byDefinition = (energy: number) => toTenths(10 * Math.log10(energy));
const level = fc.integer({ min: MIN_LEVEL_CENTI_DB, max: MAX_LEVEL_CENTI_DB });

test('the class of a sum of three levels is that of 10 lg, rounded half up', () => {
  fc.assert(
    fc.property(level, level, level, (a, b, c) => {
      const energy = energyOfCentiDb(a) + energyOfCentiDb(b) + energyOfCentiDb(c);
      expect(tenthsOfEnergy(energy)).toBe(byDefinition(energy));
    }),
    { numRuns: 5000 },
  );
});

test('every stored level and energies at and beside every edge have the class of 10 lg', () => {
  for (let centiDb = MIN_LEVEL_CENTI_DB; centiDb <= MAX_LEVEL_CENTI_DB; centiDb += 1) {
    const energy = 10 ** (centiDb / 1000);
    for (const factor of [1, 1 - 1e-15, 1 + 1e-15, 1 - 1e-11, 1 + 1e-11, 1 - 1e-8, 1 + 1e-8, 1.001]) {
      const beside = energy * factor;
      if (tenthsOfEnergy(beside) !== byDefinition(beside)) throw new Error(`${centiDb} times ${factor}`);
    }
  }
});

test('energies that no stored levels sum to are told by the logarithm', () => {
  for (const energy of [1e-9, 1e30]) expect(tenthsOfEnergy(energy)).toBe(byDefinition(energy));
});
