import { listHolidays } from '#db/queries/holidays';
import { listStationGroups } from '#db/queries/stationGroups';
import { listStations, type StationRow } from '#db/queries/stations';
import { bandsOf, type Band } from '#lib/acoustics/bands';
import { measures } from './measures';

/** What a limit of a network may be about. */
export interface LimitChoices {
  stations: { code: string; name: string }[];
  groups: { id: number; name: string }[];
  /** Bands that some station measures, thirds before octaves, each in ascending order; without stations every band. */
  bands: Band[];
  /** How many named dates the network has. */
  holidayCount: number;
}

/** Stations in use and their bands, and those that a limit names already (by code). */
export async function limitChoices(networkId: number, named: readonly string[] = []): Promise<LimitChoices> {
  const stations = (await listStations(networkId)).filter(
    ({ code, retiredAt }) => retiredAt === null || named.includes(code),
  );
  return {
    holidayCount: (await listHolidays(networkId)).length,
    stations: stations.map(({ code, name }) => ({ code, name })),
    groups: (await listStationGroups(networkId)).map(({ id, name }) => ({ id, name })),
    bands: ([3, 1] as const).flatMap((fraction) =>
      bandsOf(fraction).filter((band) => stations.length === 0 || isMeasured(band, stations)),
    ),
  };
}

function isMeasured(band: Band, stations: readonly StationRow[]): boolean {
  return stations.some((station) => measures(station, band));
}
