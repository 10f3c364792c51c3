import { pool, type Connection } from './connection';

/** A UTC quarter-hour as far as health asks: what was received of it, and how quiet it was. */
export interface QuarterEvidence {
  startSec: number;
  validSec: number;
  excludedSec: number;
  lafminCentiDb: number | null;
  /** Sum over valid seconds of 10^(LAeq/10). */
  aEnergySec: number;
}

/** Computed quarter-hours of a station that begin in `fromSec <= t < toSec`, ascending; those without any interval have no row. */
export async function selectQuarterEvidence(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<QuarterEvidence[]> {
  const [rows] = await conn
    .raw(
      `SELECT starts_at, valid_sec, excluded_sec, lafmin_centi_db, a_energy_sec FROM quarter_hours
       WHERE station_id = ? AND starts_at >= ? AND starts_at < ? ORDER BY starts_at`,
      [stationId, fromSec, toSec],
    )
    .options({ rowsAsArray: true });
  return (rows as [number, number, number, number | null, number][]).map(
    ([startSec, validSec, excludedSec, lafminCentiDb, aEnergySec]) => ({
      startSec,
      validSec,
      excludedSec,
      lafminCentiDb,
      aEnergySec,
    }),
  );
}

/** Wind speeds in a stretch: how many, and between which. */
export interface WindEvidence {
  count: number;
  /** Beginning of the first interval that has one. */
  firstSec: number | null;
  leastMs: number | null;
  mostMs: number | null;
}

export async function selectWindEvidence(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<WindEvidence> {
  const row = await conn('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .whereNotNull('wind_speed_centi_ms')
    .first({
      count: conn.raw('COUNT(*)'),
      first: conn.raw('MIN(starts_at)'),
      least: conn.raw('MIN(wind_speed_centi_ms)'),
      most: conn.raw('MAX(wind_speed_centi_ms)'),
    });
  const metres = (cell: number | null) => (cell === null ? null : Number(cell) / 100);
  return {
    count: Number(row.count),
    firstSec: row.first,
    leastMs: metres(row.least),
    mostMs: metres(row.most),
  };
}

/** How many records of a station were refused since an instant because they ended in the future. */
export async function countClockAhead(
  stationId: number,
  since: Date,
  conn: Connection = pool(),
): Promise<number> {
  const row = await conn('quarantine')
    .where({ station_id: stationId, code: 'clock-ahead', settled_at: null })
    .where('received_at', '>=', since)
    .count({ count: '*' })
    .first();
  return Number(row?.['count'] ?? 0);
}
