import { pool, type Connection } from '#db/queries/connection';
import { listMasts } from '#db/queries/masts';
import { listStations } from '#db/queries/stations';
import { findStationWind, type StationWindRecord } from '#db/queries/stationWind';
import { findLastWeather } from '#db/queries/weatherRecords';

/** Wind at a place of a network, as its newest record tells it. */
export interface WindAt {
  source: 'mast' | 'station';
  code: string;
  name: string;
  latitude: number;
  longitude: number;
  /** m/s. */
  speedMs: number;
  /** Degrees clockwise of north that it comes from; null: not told. */
  fromDeg: number | null;
  /** Seconds from the record's end to the instant asked for; never below 0. */
  ageSec: number;
}

/** A record older than this says nothing about an instant. */
const MOST_AGE_SEC = 3600;

/** Wind of a network at an instant (epoch seconds): of each mast, and of each station that has a sensor of its own; those retired by then are left out. */
export async function networkWind(
  networkId: number,
  atSec: number,
  conn: Connection = pool(),
): Promise<WindAt[]> {
  const isInService = ({ retiredAt }: { retiredAt: Date | null }) =>
    retiredAt === null || retiredAt.getTime() > atSec * 1000;
  const [masts, stations] = [await listMasts(networkId, conn), await listStations(networkId, conn)];
  const found = await Promise.all([
    ...masts
      .filter(isInService)
      .map(async (mast) => windAt('mast', mast, await findLastWeather(mast.id, atSec, conn), atSec)),
    ...stations
      .filter(isInService)
      .map(async (one) => windAt('station', one, await findStationWind(one.id, atSec, conn), atSec)),
  ]);
  return found.filter((wind) => wind !== null);
}

function windAt(
  source: WindAt['source'],
  place: Pick<WindAt, 'code' | 'name' | 'latitude' | 'longitude'>,
  record: StationWindRecord | undefined,
  atSec: number,
): WindAt | null {
  if (!record) return null;
  const ageSec = Math.max(0, atSec - (record.startSec + record.durationSec));
  if (ageSec > MOST_AGE_SEC) return null;
  const { code, name, latitude, longitude } = place;
  const { windSpeedMs: speedMs, windDirectionDeg: fromDeg } = record;
  return { source, code, name, latitude, longitude, speedMs, fromDeg, ageSec };
}
