import { describe, expect, test } from 'vitest';
import { bandByNominalHz, FIRST_BAND_INDEX } from '#lib/acoustics/bands';
import { roundHalfUp } from '#lib/acoustics/rounding';
import {
  aWeightDb,
  aWeightOfBandDb,
  cWeightDb,
  cWeightOfBandDb,
  levelFromBandsDb,
  type Weighting,
} from '#lib/acoustics/weighting';
import { present, readJson } from './support/fixtures';

/** IEC 61672-1:2013 Table 3 and Annex E as read in public text (fixtures/reference/weights.json "source"). */
interface WeightsRow {
  n: number;
  nominal_hz: number;
  exact_hz: number;
  A: number;
  C: number;
  A_analytic_exact_freq: number;
  C_analytic_exact_freq: number;
  A_analytic_nominal_freq: number;
  C_analytic_nominal_freq: number;
}
interface WeightsFile {
  verification: {
    worst_A_error_if_analytic_is_evaluated_at_nominal_instead_of_exact: { dB: number; nominal_hz: number };
    worst_C_likewise: { dB: number; nominal_hz: number };
  };
  worked: {
    octave_spectrum_Z: Record<string, number>;
    LA: number;
    LC: number;
    LZ: number;
    C_minus_A: number;
    wrong_if_A_applied_twice: number;
  };
  rows: WeightsRow[];
}

const file = readJson<WeightsFile>('reference/weights.json');
const stored = file.rows.filter((row) => row.n >= FIRST_BAND_INDEX);

describe('weightings (IEC 61672-1, fixtures/reference/weights.json)', () => {
  test.each(file.rows)(
    'at $nominal_hz Hz: analytic at the exact frequency, and the table to 0.1 dB',
    (row) => {
      const exactHz = 1000 * 10 ** (row.n / 10);
      expect(aWeightDb(exactHz)).toBeCloseTo(row.A_analytic_exact_freq, 4);
      expect(cWeightDb(exactHz)).toBeCloseTo(row.C_analytic_exact_freq, 4);
      expect(roundHalfUp(aWeightDb(exactHz), 1)).toBe(row.A);
      expect(roundHalfUp(cWeightDb(exactHz), 1)).toBe(row.C);
    },
  );

  test('every stored band has its weights by index', () => {
    expect(stored).toHaveLength(33);
    for (const row of stored) {
      expect(aWeightOfBandDb(row.n)).toBeCloseTo(row.A_analytic_exact_freq, 4);
      expect(cWeightOfBandDb(row.n)).toBeCloseTo(row.C_analytic_exact_freq, 4);
    }
  });

  test('weights are not those of the nominal frequencies', () => {
    const { verification } = file;
    const worstA = verification.worst_A_error_if_analytic_is_evaluated_at_nominal_instead_of_exact;
    const aAtNominalDb = aWeightDb(worstA.nominal_hz) - aWeightOfBandDb(indexOf(worstA.nominal_hz));
    expect(aAtNominalDb).toBeCloseTo(worstA.dB, 4);
    const worstC = verification.worst_C_likewise;
    const cAtNominalDb = cWeightDb(worstC.nominal_hz) - cWeightOfBandDb(indexOf(worstC.nominal_hz));
    expect(cAtNominalDb).toBeCloseTo(worstC.dB, 4);
  });

  test('worked octave spectrum: LA, LC, LZ and C − A, weighted once', () => {
    const { worked } = file;
    const bands = Object.keys(worked.octave_spectrum_Z).map((hz) => present(bandByNominalHz(1, Number(hz))));
    const levelsDb = Object.values(worked.octave_spectrum_Z);
    const level = (weighting: Weighting) => present(levelFromBandsDb(levelsDb, bands, weighting));
    // The file's worked levels use weights rounded to 0.1 dB; ours are analytic.
    expect(Math.abs(level('A') - worked.LA)).toBeLessThan(0.02);
    expect(Math.abs(level('C') - worked.LC)).toBeLessThan(0.02);
    expect(level('Z')).toBeCloseTo(worked.LZ, 4);
    expect(Math.abs(level('C') - level('A') - worked.C_minus_A)).toBeLessThan(0.03);
    expect(Math.abs(level('A') - worked.wrong_if_A_applied_twice)).toBeGreaterThan(1);
  });
});

function indexOf(nominalHz: number): number {
  return present(file.rows.find((row) => row.nominal_hz === nominalHz)).n;
}
