import type { WeatherRecord } from '#lib/acoustics/mastWeather';
import { pool, type Connection } from './connection';

/** A mast's record as stored. */
export interface StoredWeather extends WeatherRecord {
  temperatureC: number | null;
}

const LONGEST_RECORD_SEC = 3600;

type Cells = [number, number, number, number | null, number | null, number | null];

/** Records of a mast that overlap `fromSec <= t < toSec`, ascending, and the nearest one on either side within `besideSec`. */
export async function selectWeather(
  mastId: number,
  fromSec: number,
  toSec: number,
  besideSec: number,
  conn: Connection = pool(),
): Promise<StoredWeather[]> {
  const [rows] = await conn
    .raw(
      `SELECT starts_at, duration_sec, wind_speed_centi_ms, wind_direction_deg, rain_centi_mm, temperature_centi_c
       FROM weather_records
       WHERE mast_id = ? AND starts_at > ? AND starts_at < ? AND starts_at + duration_sec > ? ORDER BY starts_at`,
      [mastId, fromSec - besideSec - LONGEST_RECORD_SEC, toSec + besideSec, fromSec - besideSec],
    )
    .options({ rowsAsArray: true });
  return (rows as Cells[]).map(weatherOf);
}

/** The newest record of a mast that begins at an instant or before it. */
export async function findLastWeather(
  mastId: number,
  atSec: number,
  conn: Connection = pool(),
): Promise<StoredWeather | undefined> {
  const [rows] = await conn
    .raw(
      `SELECT starts_at, duration_sec, wind_speed_centi_ms, wind_direction_deg, rain_centi_mm, temperature_centi_c
       FROM weather_records WHERE mast_id = ? AND starts_at <= ? ORDER BY starts_at DESC LIMIT 1`,
      [mastId, atSec],
    )
    .options({ rowsAsArray: true });
  const [row] = rows as Cells[];
  return row && weatherOf(row);
}

function weatherOf([startSec, durationSec, wind, windDirectionDeg, rain, temperature]: Cells): StoredWeather {
  return {
    startSec,
    durationSec,
    windSpeedMs: wind / 100,
    windDirectionDeg,
    rainMm: rain === null ? null : rain / 100,
    temperatureC: temperature === null ? null : temperature / 100,
  };
}

/** Adds records of a mast. A start that exists fails the whole statement; nothing is clamped or replaced. */
export async function insertWeather(
  mastId: number,
  records: readonly StoredWeather[],
  receivedAtSec: number,
  conn: Connection,
): Promise<void> {
  for (let first = 0; first < records.length; first += 1000) {
    await conn('weather_records').insert(
      records.slice(first, first + 1000).map((record) => ({
        mast_id: mastId,
        starts_at: record.startSec,
        duration_sec: record.durationSec,
        wind_speed_centi_ms: hundredths(record.windSpeedMs),
        wind_direction_deg: record.windDirectionDeg,
        rain_centi_mm: hundredths(record.rainMm),
        temperature_centi_c: hundredths(record.temperatureC),
        received_at: receivedAtSec,
      })),
    );
  }
}

function hundredths(value: number | null): number | null {
  return value === null ? null : Math.round(value * 100);
}

/** Takes one record of a mast out of the stored ones. */
export async function deleteWeather(
  mastId: number,
  startSec: number,
  transaction: Connection,
): Promise<void> {
  await transaction('weather_records').where({ mast_id: mastId, starts_at: startSec }).delete();
}
