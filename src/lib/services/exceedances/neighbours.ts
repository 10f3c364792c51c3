import type { NetworkSettings } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import type { Neighbour } from '#lib/contracts/exceedanceDetail';
import { distanceM } from '../complaints/whereabouts';
import { periodFigures } from '../levels/figures';
import type { Span } from '../levels/spans';
import { levelOrNull } from '../levels/statistics';

const MOST_NEIGHBOURS = 8;

/** The other stations' levels in the same window, the nearest first; those that had been retired before it are left out. */
export async function neighboursOf(
  station: StationRow,
  window: Span,
  timeline: NetworkSettings[],
  nowSec: number,
): Promise<Neighbour[]> {
  const stations = await listStations(station.networkId);
  const nearest = stations
    .filter(({ id, retiredAt }) => {
      return id !== station.id && (retiredAt === null || retiredAt.getTime() / 1000 > window.fromSec);
    })
    .map((other) => ({ other, metres: distanceM(station, other) }))
    .sort((a, b) => a.metres - b.metres)
    .slice(0, MOST_NEIGHBOURS);
  return Promise.all(
    nearest.map(async ({ other, metres }) => {
      const figures = await periodFigures({ station: other, timeline, nowSec, ...window });
      return {
        station: other.code,
        name: other.name,
        distanceM: Math.round(metres),
        LAeq: figures.levels.laeqDb(),
        LAFmax: levelOrNull(figures.levels.sums.lafmaxCentiDb),
        coverage: figures.coverage,
        meetsMinimum: figures.meetsMinimum,
      };
    }),
  );
}
