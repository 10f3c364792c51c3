import { listStationsOverLimit } from '#db/queries/exceedanceRecords';
import { listLatest } from '#db/queries/stationLatest';
import { listStations, type StationRow } from '#db/queries/stations';
import { type Station } from '#lib/contracts/stations';
import { stationView } from './view';

/** How long after the end of a window that exceeded a limit a station is told to be over it. */
const OVER_LIMIT_FOR_SEC = 3600;

/** Stations of a network by code, each with its newest interval and state. */
export async function stationsOf(networkId: number): Promise<Station[]> {
  const nowSec = Math.floor(Date.now() / 1000);
  const [stations, latest, overLimit] = await Promise.all([
    listStations(networkId),
    listLatest(networkId),
    listStationsOverLimit(networkId, nowSec - OVER_LIMIT_FOR_SEC),
  ]);
  const byStation = new Map(latest.map((one) => [one.stationId, one]));
  return stations.map((station) =>
    stationView(station, byStation.get(station.id), nowSec, overLimit.has(station.id)),
  );
}

/** Codes and names of a network's stations, by code. */
export async function stationNames(networkId: number): Promise<{ code: string; name: string }[]> {
  return (await listStations(networkId)).map(({ code, name }) => ({ code, name }));
}

/** One station with its newest interval and state. */
export async function stationNow(station: StationRow): Promise<Station> {
  const nowSec = Math.floor(Date.now() / 1000);
  const [latest, overLimit] = await Promise.all([
    listLatest(station.networkId),
    listStationsOverLimit(station.networkId, nowSec - OVER_LIMIT_FOR_SEC),
  ]);
  const ofStation = latest.find((one) => one.stationId === station.id);
  return stationView(station, ofStation, nowSec, overLimit.has(station.id));
}
