import { pool, type Connection } from './connection';

/** Intervals of a window that carry the same flags, taken together. */
export interface FlaggedConditions {
  /** Stored mask of flags. */
  flags: number;
  intervals: number;
  /** Length of the intervals together. */
  seconds: number;
  /** Seconds of intervals that have a wind speed, and speed (m/s) times seconds summed over them. */
  windSeconds: number;
  windMetres: number;
  maximumWindMs: number | null;
  /** Seconds with a wind speed above the bound. */
  windySeconds: number;
  minimumTemperatureC: number | null;
  maximumTemperatureC: number | null;
  /** Seconds of intervals that arrived later than `lateAfterSec` after their end. */
  lateSeconds: number;
}

const LONGEST_INTERVAL_SEC = 3600;

/** Weather, flags and lateness of a station's intervals that overlap `fromSec <= t < toSec`, by mask of flags. */
export async function sumConditions(
  stationId: number,
  window: { fromSec: number; toSec: number },
  bounds: { maximumWindSpeedMs: number; lateAfterSec: number },
  conn: Connection = pool(),
): Promise<FlaggedConditions[]> {
  const { fromSec, toSec } = window;
  const rows: Record<keyof FlaggedConditions, string | number | null>[] = await conn('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '>', fromSec - LONGEST_INTERVAL_SEC)
    .where('starts_at', '<', toSec)
    .whereRaw('starts_at + duration_sec > ?', [fromSec])
    .groupBy('flags')
    .orderBy('flags')
    .select(
      conn.raw(
        `flags, COUNT(*) AS intervals, SUM(duration_sec) AS seconds,
         SUM(IF(wind_speed_centi_ms IS NULL, 0, duration_sec)) AS windSeconds,
         COALESCE(SUM(wind_speed_centi_ms * duration_sec), 0) / 100 AS windMetres,
         MAX(wind_speed_centi_ms) / 100 AS maximumWindMs,
         SUM(IF(wind_speed_centi_ms > ?, duration_sec, 0)) AS windySeconds,
         MIN(temperature_centi_c) / 100 AS minimumTemperatureC,
         MAX(temperature_centi_c) / 100 AS maximumTemperatureC,
         SUM(IF(received_at > starts_at + duration_sec + ?, duration_sec, 0)) AS lateSeconds`,
        [bounds.maximumWindSpeedMs * 100, bounds.lateAfterSec],
      ),
    );
  const known = (value: string | number | null) => (value === null ? null : Number(value));
  return rows.map((row) => ({
    flags: Number(row.flags),
    intervals: Number(row.intervals),
    seconds: Number(row.seconds),
    windSeconds: Number(row.windSeconds),
    windMetres: Number(row.windMetres),
    maximumWindMs: known(row.maximumWindMs),
    windySeconds: Number(row.windySeconds),
    minimumTemperatureC: known(row.minimumTemperatureC),
    maximumTemperatureC: known(row.maximumTemperatureC),
    lateSeconds: Number(row.lateSeconds),
  }));
}
