import { pool, type Connection } from './connection';

/** Valid seconds of a station in the days, evenings and nights that begin in a local month. */
export interface StationMonth {
  /** `YYYY-MM`. */
  month: string;
  stationId: number;
  validSec: number;
}

/** Months of a network in which a station has data, latest first; days without any interval have no row and count nothing. */
export async function listStationMonths(
  networkId: number,
  conn: Connection = pool(),
): Promise<StationMonth[]> {
  const rows: StationMonth[] = await conn('day_periods as d')
    .join('stations as s', 's.id', 'd.station_id')
    .where({ 's.network_id': networkId })
    .groupByRaw(`DATE_FORMAT(d.local_date, '%Y-%m'), d.station_id`)
    .orderBy([{ column: 'month', order: 'desc' }, { column: 'stationId' }])
    .select({ month: conn.raw(`DATE_FORMAT(d.local_date, '%Y-%m')`), stationId: 'd.station_id' })
    .sum({ validSec: 'd.valid_sec' });
  return rows.map((row) => ({ ...row, validSec: Number(row.validSec) }));
}

/** Whether a station has anything in `fromSec <= t < toSec`: intervals, or what was summed of them. */
export async function hasData(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection = pool(),
): Promise<boolean> {
  // An interval may begin before, a quarter-hour at whatever part of it.
  const range = [stationId, fromSec - 3600, toSec];
  const [[row]] = await conn.raw(
    `SELECT EXISTS (SELECT 1 FROM quarter_hours WHERE station_id = ? AND starts_at > ? AND starts_at < ?)
        OR EXISTS (SELECT 1 FROM interval_levels WHERE station_id = ? AND starts_at > ? AND starts_at < ?) AS found`,
    [...range, ...range],
  );
  return Number(row.found) === 1;
}
