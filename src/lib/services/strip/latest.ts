import { listLatest, type LatestInterval } from '#db/queries/stationLatest';
import { type StationRow } from '#db/queries/stations';

/** The newest interval of a station, or null before its first. */
export async function latestOfStation(
  station: Pick<StationRow, 'id' | 'networkId'>,
): Promise<LatestInterval | null> {
  const latest = await listLatest(station.networkId);
  return latest.find(({ stationId }) => stationId === station.id) ?? null;
}
