import { listStations, type StationRow } from '#db/queries/stations';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { type Station } from '#lib/contracts/stations';
import { periodFigures } from '../levels/figures';
import { stationsOf } from './list';

/** What a period gave at a station. */
export interface StationFigures {
  laeqDb: number | null;
  lafmaxDb: number | null;
  la90Db: number | null;
  coverage: number;
  meetsMinimum: boolean;
}

export interface StationOverview {
  station: Station;
  figures: StationFigures;
}

/** Stations of a network by code with their state now and the figures of a period (epoch seconds, half-open). */
export async function stationsOverview(
  networkId: number,
  fromSec: number,
  toSec: number,
): Promise<StationOverview[]> {
  const [rows, stations] = await Promise.all([listStations(networkId), stationsOf(networkId)]);
  const byCode = new Map(rows.map((row) => [row.code, row]));
  const overviews = stations.map(async (station) => {
    const row = byCode.get(station.code);
    return row ? [{ station, figures: await figuresOf(row, fromSec, toSec) }] : [];
  });
  return (await Promise.all(overviews)).flat();
}

async function figuresOf(station: StationRow, fromSec: number, toSec: number): Promise<StationFigures> {
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
