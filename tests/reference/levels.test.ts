import { describe, expect, test } from 'vitest';
import { subtractBackgroundDb } from '#lib/acoustics/background';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { energyMeanDb, energySumDb } from '#lib/acoustics/energy';
import { laeDb, laeqOfExposuresDb } from '#lib/acoustics/exposure';
import { l10of18hDb } from '#lib/acoustics/l10of18h';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { present } from './support/fixtures';
import {
  check,
  examples,
  expectLevel,
  expectLevelNear,
  isOfWholeDays,
  unchecked,
} from './support/levelsExamples';

function countsOf(levels: readonly [levelDb: number, sec: number][]): LevelClassCounts {
  const counts = new LevelClassCounts();
  for (const [levelDb, sec] of levels) counts.add(levelDb * 100, sec);
  return counts;
}

describe('energy sums and means', () => {
  for (const id of ['sum-3', 'sum-2', 'sum-equal']) {
    check(id, (example) => expectLevel(energySumDb(example.input as number[]), example));
  }
  for (const id of ['avg-3', 'leq-4x15min', 'leq-60-80']) {
    check(id, (example) => expectLevel(energyMeanDb(example.input as number[]), example));
  }
  check('leq-unequal', (example) => {
    const { levels, minutes } = example.input as { levels: number[]; minutes: number[] };
    expectLevel(energyMeanDb(levels, minutes), example);
  });
  check('year-average', (example) => {
    const { energy_mean } = example.expect as { energy_mean: number };
    expectLevel(energyMeanDb(example.input as number[]), { ...example, expect: energy_mean });
  });
  check('coverage-zero-fill', (example) => {
    const { valid, elapsed, level } = example.input as { valid: number; elapsed: number; level: number };
    const { Leq_valid, coverage } = example.expect as { Leq_valid: number; coverage: number };
    expectLevel(energyMeanDb(new Array<number>(valid).fill(level)), { ...example, expect: Leq_valid });
    expect(valid / elapsed).toBe(coverage);
  });
});

describe('residual sound', () => {
  for (const id of ['sub-1', 'sub-10dB']) {
    check(id, (example) => {
      const { measured, residual } = example.input as { measured: number; residual: number };
      const result = subtractBackgroundDb(measured, residual);
      expectLevel(result.kind === 'corrected' ? result.levelDb : null, example);
    });
  }
  check('sub-3dB', (example) => {
    const { corrected_informative, reportable } = example.expect as Record<string, number>;
    const result = subtractBackgroundDb(53, 50);
    expect(result).toMatchObject({ kind: 'refused', reason: 'within-3-db', upperBoundDb: reportable });
    expectLevelNear(result.kind === 'refused' ? result.informativeDb : null, corrected_informative);
  });
  check('sub-neg', (example) => {
    const { measured, residual } = example.input as { measured: number; residual: number };
    expect(subtractBackgroundDb(measured, residual)).toEqual({
      kind: 'refused',
      reason: 'not-below',
      upperBoundDb: measured,
      informativeDb: example.expect,
    });
  });
});

describe('sound exposure', () => {
  for (const id of ['1s', '1min', '15min', '1h', '8h', '16h', '24h']) {
    check(`sel-T-${id}`, (example) => {
      const { LAeq, T_s } = example.input as { LAeq: number; T_s: number };
      expectLevel(laeDb(LAeq, T_s), example);
    });
  }
  check('sel-events', (example) => {
    const { N, SEL, T_s } = example.input as { N: number; SEL: number; T_s: number };
    expectLevel(laeqOfExposuresDb(new Array<number>(N).fill(SEL), T_s), example);
  });
  check('sel-mix', (example) => {
    const wanted = example.expect as { all: number; cars_only: number };
    const trucks = new Array<number>(2000).fill(80);
    const cars = new Array<number>(18000).fill(65);
    expectLevelNear(laeqOfExposuresDb([...trucks, ...cars], 86_400), wanted.all);
    expectLevelNear(laeqOfExposuresDb(cars, 86_400), wanted.cars_only);
  });
});

describe('exceedance levels', () => {
  check('ln-100', (example) => {
    const { exceedance_inverted_cdf } = example.expect as { exceedance_inverted_cdf: Record<string, number> };
    const counts = countsOf(Array.from({ length: 100 }, (_, i) => [41 + i, 1]));
    for (const [name, levelDb] of Object.entries(exceedance_inverted_cdf)) {
      const percent = Number(name.slice(1));
      expect(counts.exceededTenths(percent), name).toBe(levelDb * 10);
      // 100 samples are enough for L10, L50, L90, and L95 (60), not for L1 (300).
      expect(counts.exceedanceLevelDb(percent, 1), name).toBe(name === 'L1' ? null : levelDb);
    }
    expect(counts.exceedanceLevelDb(10, 1), 'direction swapped').not.toBe(50);
  });
  check('ln-step', (example) => {
    const wanted = example.expect as Record<string, number>;
    const counts = countsOf([...new Array(5).fill([50, 60]), ...new Array(55).fill([40, 60])]);
    for (const percent of [1, 5, 8, 9, 10, 50, 90]) {
      expect(counts.exceededTenths(percent), `L${percent}`).toBe(present(wanted[`L${percent}`]) * 10);
    }
    expectLevelNear(energyMeanDb([50, 40], [5, 55]), wanted['Leq']);
    // Mixed lengths, weighted by duration as always here, give the same level but no L_N to publish.
    const mixed = countsOf([
      [50, 300],
      [40, 3300],
    ]);
    expect(mixed.exceededTenths(10)).toBe(400);
    expect(mixed.exceedanceLevelDb(10, null)).toBeNull();
  });
  check('ln-not-energy', () => {
    // 12 quiet hours and 12 loud ones: the merged distribution, not any mean of the hours' L90.
    const quiet = countsOf(Array.from({ length: 720 }, (_, i) => [40 + (i % 10) / 10, 60]));
    const loud = countsOf(Array.from({ length: 720 }, (_, i) => [60 + (i % 10) / 10, 60]));
    const [quietL90, loudL90] = [quiet.exceedanceLevelDb(90, 60), loud.exceedanceLevelDb(90, 60)].map((l) =>
      present(l),
    );
    quiet.merge(loud);
    const merged = present(quiet.exceedanceLevelDb(90, 60));
    expect(merged).toBe(40.1);
    expect(Math.abs(merged - (present(quietL90) + present(loudL90)) / 2)).toBeGreaterThan(9);
    expect(Math.abs(merged - present(energyMeanDb([present(quietL90), present(loudL90)])))).toBeGreaterThan(
      15,
    );
  });
  check('crtn-l10-18h', (example) => {
    const { L10_18h, reported } = example.expect as { L10_18h: number; reported: number };
    const level = l10of18hDb(example.input as number[]);
    expectLevel(level, { ...example, expect: L10_18h });
    expect(roundHalfUp(present(level), 0)).toBe(reported);
  });
});

test('no other example is forgotten: only the shortened L10 (from memory) is not part of the core', () => {
  expect(unchecked(examples.filter((example) => !isOfWholeDays(example)))).toEqual(['crtn-short']);
});
