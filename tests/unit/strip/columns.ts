import { bandsOf } from '#lib/acoustics/bands';
import { toCentiDb } from '#lib/acoustics/rounding';
import { emptyColumns, type StripColumns } from '../../../src/components/strip/model/stripColumns';

/** Three octaves' thirds 80 Hz–630 Hz (nine bands), enough for the model's tests. */
export const NINE_THIRDS = bandsOf(3).slice(8, 17);

/** Columns whose LAeq is `levelsDb` (null = no data), with LAFmax 10 dB above and every band 5 dB below. */
export function columnsOf(
  levelsDb: readonly (number | null)[],
  { fromSec = 0, stepSec = 60, bands = NINE_THIRDS } = {},
): StripColumns {
  const columns = emptyColumns(fromSec, stepSec, levelsDb.length, bands);
  levelsDb.forEach((levelDb, at) => {
    if (levelDb === null) return;
    columns.laeqCentiDb[at] = toCentiDb(levelDb);
    columns.lafmaxCentiDb[at] = toCentiDb(levelDb + 10);
    columns.presentSec[at] = stepSec;
    columns.validSec[at] = stepSec;
    columns.levelsCentiDb.fill(toCentiDb(levelDb - 5), at * bands.length, (at + 1) * bands.length);
  });
  return columns;
}

/** The same columns with LA10, LA50 and LA90 of one block, dB. */
export function withPercentiles(
  columns: StripColumns,
  [la10Db, la50Db, la90Db]: readonly [number, number, number],
  blockSec = 3600,
): StripColumns {
  const all = (levelDb: number) => new Int16Array(columns.count).fill(toCentiDb(levelDb));
  return {
    ...columns,
    percentiles: { blockSec, la10CentiDb: all(la10Db), la50CentiDb: all(la50Db), la90CentiDb: all(la90Db) },
  };
}
