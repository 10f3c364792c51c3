import { pool, type Connection } from './connection';
import { runPrepared } from './prepared';

/** A-weighted energy and seconds of a quarter-hour: what levels of many periods are summed from. */
export interface QuarterEnergy {
  startSec: number;
  validSec: number;
  excludedSec: number;
  /** Sum over the valid seconds of 10^(LAeq/10). */
  aEnergySec: number;
  lafmaxCentiDb: number | null;
}

const SELECT = `SELECT starts_at, valid_sec, excluded_sec, a_energy_sec, lafmax_centi_db FROM quarter_hours
  WHERE station_id = ? AND starts_at >= ? AND starts_at < ? ORDER BY starts_at`;

/** Of the computed quarter-hours of a station that begin in `fromSec <= t < toSec`, ascending: a year is read at once. */
export async function selectQuarterEnergies(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<QuarterEnergy[]> {
  const [rows] = await runPrepared(conn, [{ statement: SELECT, cells: [stationId, fromSec, toSec] }]);
  return (rows as [number, number, number, number, number | null][]).map(
    ([startSec, validSec, excludedSec, aEnergySec, lafmaxCentiDb]) => ({
      startSec,
      validSec,
      excludedSec,
      aEnergySec,
      lafmaxCentiDb,
    }),
  );
}
