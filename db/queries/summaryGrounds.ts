import { createHash } from 'node:crypto';
import { pool, type Connection } from './connection';

/** A network’s month: local dates, and the civil month in epoch seconds. */
export interface MonthGround {
  networkId: number;
  /** First date of the year, and the first date after the month. */
  yearDate: string;
  endDate: string;
  fromSec: number;
  toSec: number;
}

const sumOf = (columns: string) =>
  `COUNT(*) AS rows_found, SUM(CRC32(CONCAT_WS('|', ${columns}))) AS sum_found`;
const orDash = (columns: readonly string[]) => columns.map((column) => `COALESCE(${column}, '-')`).join(', ');

const PERIOD_COLUMNS = orDash([
  'd.local_date',
  'd.period',
  'd.starts_at',
  'd.ends_at',
  'd.valid_sec',
  'd.excluded_sec',
  'd.sample_sec',
  'd.a_energy_sec',
  'd.c_energy_sec',
  'd.c_valid_sec',
  'd.lafmax_centi_db',
  'd.lafmin_centi_db',
  'd.lcpeak_centi_db',
  'd.flags',
  'CRC32(d.band_energies)',
  'CRC32(d.a_classes)',
]);

/**
 * A digest of what the figures of a month rest on, cheap enough to take each hour: stored sums of days, evenings and nights since the
 * year began, and whatever people decide about them. The same digest: nothing to compare. It is no seal.
 */
export async function monthFingerprint(ground: MonthGround, conn: Connection = pool()): Promise<Buffer> {
  const { networkId, yearDate, endDate, fromSec, toSec } = ground;
  const asked: [sql: string, bindings: (string | number)[]][] = [
    [
      `SELECT d.station_id, ${sumOf(PERIOD_COLUMNS)} FROM day_periods d JOIN stations s ON s.id = d.station_id
       WHERE s.network_id = ? AND d.local_date >= ? - INTERVAL 1 DAY AND d.local_date < ?
       GROUP BY d.station_id ORDER BY d.station_id`,
      [networkId, yearDate, endDate],
    ],
    [
      `SELECT ${sumOf(orDash(['id', 'code', 'name', 'retired_at', 'placement']))} FROM stations WHERE network_id = ?`,
      [networkId],
    ],
    [
      `SELECT ${sumOf(orDash(['id', 'state', 'level_db', 'coverage', 'cause', 'cause_detail', 'acknowledged_at']))}
       FROM exceedances WHERE network_id = ? AND starts_at >= ? AND starts_at < ?`,
      [networkId, fromSec, toSec],
    ],
    [
      `SELECT ${sumOf(orDash(['id', 'withdrawn_at']))} FROM exclusions
       WHERE network_id = ? AND starts_at < ? AND ends_at > ?`,
      [networkId, toSec + 86_400, fromSec],
    ],
    [`SELECT ${sumOf(orDash(['id', 'withdrawn_at']))} FROM calibrations WHERE network_id = ?`, [networkId]],
    [
      `SELECT ${sumOf(orDash(['v.id', 'l.withdrawn_at']))}
       FROM limit_versions v JOIN limits l ON l.id = v.limit_id WHERE l.network_id = ?`,
      [networkId],
    ],
    [
      `SELECT ${sumOf(orDash(['effective_from', 'created_at']))} FROM network_settings WHERE network_id = ?`,
      [networkId],
    ],
  ];
  const hash = createHash('sha256');
  for (const [sql, bindings] of asked) {
    const [rows] = (await conn.raw(sql, bindings)) as [unknown[]];
    hash.update(JSON.stringify(rows));
  }
  return hash.digest();
}
