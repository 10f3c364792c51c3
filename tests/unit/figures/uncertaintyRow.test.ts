import { expect, test } from 'vitest';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type PeriodDrift } from '#lib/services/calibrations/periodDrift';
import { uncertaintyRow } from '#lib/services/figures/uncertaintyRow';
import { type PeriodFigures } from '#lib/services/levels/figures';

const levels = new PeriodAccumulator();
levels.sums.validSec = 3600;
const FIGURES: PeriodFigures = {
  fromSec: 0,
  toSec: 3600,
  seconds: { expected: 3600, valid: 3600, excluded: 0 },
  coverage: 1,
  meetsMinimum: true,
  minimumCoverage: 0.75,
  levels,
  keptNote: null,
};
const rowWith = (drift: PeriodDrift) =>
  uncertaintyRow(FIGURES, [], {
    words: '',
    uncertaintyDb: 0.5,
    basis: 'class 1',
    basisKind: 'class-1',
    drift,
  });

test('calibration drift about the period is a term of its uncertainty, and said', () => {
  const row = rowWith({ driftDb: 1.2, known: 'both' });
  expect(row.value).toBeCloseTo(2 * Math.hypot(0.5, 1.2), 10);
  expect(row.note).toContain('calibration drift 1.20 dB (the largest that the checks before, in and after');
  const unchecked = rowWith({ driftDb: 0, known: 'none' });
  expect(unchecked.value).toBeCloseTo(1, 10);
  expect(unchecked.note).toContain('no check of the instrument is on record about this period');
});
