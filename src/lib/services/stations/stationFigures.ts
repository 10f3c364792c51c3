import { type StationRow } from '#db/queries/stations';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { periodFigures } from '../levels/figures';
import { type Span } from '../levels/spans';

/** What a period gave at a station. */
export interface StationFigures {
  laeqDb: number | null;
  lafmaxDb: number | null;
  la90Db: number | null;
  coverage: number;
  meetsMinimum: boolean;
}

/** The few figures of a station's period that a list shows. */
export async function stationFigures(station: StationRow, { fromSec, toSec }: Span): Promise<StationFigures> {
  const { levels, coverage, meetsMinimum } = await periodFigures(
    { station, fromSec, toSec },
    { bandPercentiles: false },
  );
  const { lafmaxCentiDb } = levels.sums;
  return {
    laeqDb: levels.laeqDb(),
    lafmaxDb: lafmaxCentiDb === null ? null : centiDbToDb(lafmaxCentiDb),
    la90Db: levels.exceedanceLevelDb(90),
    coverage,
    meetsMinimum,
  };
}
