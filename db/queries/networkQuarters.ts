import { pool, type Connection } from './connection';

/** What a map shows of a station's quarter-hour. */
export interface QuarterLevel {
  stationId: number;
  startSec: number;
  validSec: number;
  /** Energy relative to 0 dB times seconds, over the valid seconds. */
  aEnergySec: number;
}

/** Computed quarter-hours of some stations that begin in `fromSec <= t < toSec`, by station, ascending. */
export async function selectQuarterLevels(
  stationIds: readonly number[],
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<QuarterLevel[]> {
  if (stationIds.length === 0) return [];
  const [rows] = await conn
    .raw(
      `SELECT station_id, starts_at, valid_sec, a_energy_sec FROM quarter_hours
       WHERE station_id IN (${stationIds.map(() => '?').join(', ')}) AND starts_at >= ? AND starts_at < ? ORDER BY station_id, starts_at`,
      [...stationIds, fromSec, toSec],
    )
    .options({ rowsAsArray: true });
  return (rows as [number, number, number, number][]).map(([stationId, startSec, validSec, aEnergySec]) => ({
    stationId,
    startSec,
    validSec,
    aEnergySec,
  }));
}

/** Those of some stations that have quarter-hours waiting for recomputation in `fromSec <= t < toSec`. */
export async function selectDirtyStations(
  stationIds: readonly number[],
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<Set<number>> {
  const ids: number[] = await conn('dirty_marks')
    .whereIn('station_id', stationIds)
    .where('quarter_starts_at', '>=', fromSec)
    .where('quarter_starts_at', '<', toSec)
    .distinct()
    .pluck('station_id');
  return new Set(ids);
}
