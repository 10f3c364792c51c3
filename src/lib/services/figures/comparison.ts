import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type ComparedFigure, type Comparison } from '#lib/contracts/figureSheet';
import { EXCEEDANCE_PERCENTS } from '#lib/contracts/levels';
import { levelOrNull } from '../levels/statistics';

type Reading = [key: string, of: (levels: PeriodAccumulator) => number | null];

const READINGS: readonly Reading[] = [
  ['LAeq', (levels) => levels.laeqDb()],
  ['LCeq', (levels) => levels.lceqDb()],
  ['LAFmax', (levels) => levelOrNull(levels.sums.lafmaxCentiDb)],
  ['LAFmin', (levels) => levelOrNull(levels.sums.lafminCentiDb)],
  ['LCpeak', (levels) => levelOrNull(levels.sums.lcpeakCentiDb)],
  ['LAE', (levels) => levels.laeDb()],
  ...EXCEEDANCE_PERCENTS.map((n): Reading => [`LA${n}`, (levels) => levels.exceedanceLevelDb(n)]),
];

/** Figures of the valid intervals beside those of everything measured. */
export function compareWithRaw(valid: PeriodAccumulator, raw: PeriodAccumulator): Comparison {
  const figures = READINGS.map(([key, of]): ComparedFigure => {
    const [validDb, rawDb] = [of(valid), of(raw)];
    const differenceDb = validDb === null || rawDb === null ? null : validDb - rawDb;
    return { key, name: key, unit: 'dB', validDb, rawDb, differenceDb };
  });
  return { figures, rawSec: raw.sums.validSec };
}
