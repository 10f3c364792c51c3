import { listLatest } from '#db/queries/stationLatest';
import { listStations, type StationRow } from '#db/queries/stations';
import { type Station } from '#lib/contracts/stations';
import { stationView } from './view';

/** Stations of a network by code, each with its newest interval and state. */
export async function stationsOf(networkId: number): Promise<Station[]> {
  const [stations, latest] = await Promise.all([listStations(networkId), listLatest(networkId)]);
  const byStation = new Map(latest.map((one) => [one.stationId, one]));
  const nowSec = Math.floor(Date.now() / 1000);
  return stations.map((station) => stationView(station, byStation.get(station.id), nowSec));
}

/** One station with its newest interval and state. */
export async function stationNow(station: StationRow): Promise<Station> {
  const latest = (await listLatest(station.networkId)).find((one) => one.stationId === station.id);
  return stationView(station, latest, Math.floor(Date.now() / 1000));
}
