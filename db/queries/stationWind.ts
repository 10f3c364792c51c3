import { type WeatherRecord } from '#lib/acoustics/mastWeather';
import { type WindSums } from '#lib/acoustics/windOfSums';
import { pool, type Connection } from './connection';

/** An instant's wind by a station's own sensor. */
export type StationWindRecord = Pick<
  WeatherRecord,
  'startSec' | 'durationSec' | 'windSpeedMs' | 'windDirectionDeg'
>;

const LONGEST_SEC = 3600;

/** Wind by a station's own sensor in intervals that overlap `fromSec <= t < toSec`, ascending; none where it has no sensor. */
export async function selectStationWind(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection = pool(),
): Promise<StationWindRecord[]> {
  const rows: StationWindRecord[] = await windRows(stationId, conn)
    .where('starts_at', '>', fromSec - LONGEST_SEC)
    .where('starts_at', '<', toSec)
    .whereRaw('starts_at + duration_sec > ?', [fromSec])
    .orderBy('starts_at');
  return rows.map(known);
}

/** The same added up by the database: a month has tens of thousands of records. Null where there are none. */
export async function sumStationWind(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection = pool(),
): Promise<WindSums | null> {
  const [[row]] = (await conn.raw(
    `SELECT SUM(sec) AS seconds, SUM(speed * sec) AS metres, MAX(speed) AS maximumMs,
       SUM(COALESCE(SIN(RADIANS(direction)), 0) * speed * sec) AS east,
       SUM(COALESCE(COS(RADIANS(direction)), 0) * speed * sec) AS north
     FROM (SELECT LEAST(starts_at + duration_sec, ?) - GREATEST(starts_at, ?) AS sec, wind_speed_centi_ms / 100 AS speed,
         wind_direction_deg AS direction
       FROM interval_levels
       WHERE station_id = ? AND starts_at > ? AND starts_at < ? AND starts_at + duration_sec > ?
         AND wind_speed_centi_ms IS NOT NULL) AS records`,
    [toSec, fromSec, stationId, fromSec - LONGEST_SEC, toSec, fromSec],
  )) as [[Record<keyof WindSums, string | number | null>]];
  if (row.seconds === null) return null;
  return {
    seconds: Number(row.seconds),
    metres: Number(row.metres),
    maximumMs: Number(row.maximumMs),
    east: Number(row.east),
    north: Number(row.north),
  };
}

/** The newest of them that begins in the hour up to an instant. */
export async function findStationWind(
  stationId: number,
  atSec: number,
  conn: Connection = pool(),
): Promise<StationWindRecord | undefined> {
  const row: StationWindRecord | undefined = await windRows(stationId, conn)
    .where('starts_at', '<=', atSec)
    .where('starts_at', '>', atSec - LONGEST_SEC)
    .orderBy('starts_at', 'desc')
    .first();
  return row && known(row);
}

function windRows(stationId: number, conn: Connection) {
  return conn('interval_levels').where({ station_id: stationId }).whereNotNull('wind_speed_centi_ms').select({
    startSec: 'starts_at',
    durationSec: 'duration_sec',
    windSpeedMs: 'wind_speed_centi_ms',
    windDirectionDeg: 'wind_direction_deg',
  });
}

function known(row: StationWindRecord): StationWindRecord {
  return { ...row, windSpeedMs: row.windSpeedMs / 100 };
}
