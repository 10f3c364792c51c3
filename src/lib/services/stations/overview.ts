import { listLatest } from '#db/queries/stationLatest';
import { listStations, type StationRow } from '#db/queries/stations';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { type Station } from '#lib/contracts/stations';
import { periodFigures } from '../levels/figures';
import { stationView } from './view';

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
  const [stations, latest] = await Promise.all([listStations(networkId), listLatest(networkId)]);
  const byStation = new Map(latest.map((one) => [one.stationId, one]));
  const nowSec = Math.floor(Date.now() / 1000);
  return Promise.all(
    stations.map(async (station) => ({
      station: stationView(station, byStation.get(station.id), nowSec),
      figures: await figuresOf(station, fromSec, toSec),
    })),
  );
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
