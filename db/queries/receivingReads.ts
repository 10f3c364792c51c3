import { isShiftedText } from './clockShifts';
import { INTERVAL_COLUMNS, type IntervalCells } from './intervalRows';
import { LONGEST_INTERVAL_SEC } from './intervals';
import type { TokenStation } from './stationTokens';

/** Where a post's records lie: of a station, `fromSec <= t < toSec`. */
export interface StationStretch {
  stationId: number;
  fromSec: number;
  toSec: number;
}

/** The statement that locks some stations, ascending, and answers their ids: only those that are free now, or after waiting for the others. */
export function lockStationsText(ids: readonly number[], isWaiting: boolean): string {
  return `SELECT station_id FROM station_locks FORCE INDEX (PRIMARY) WHERE station_id IN (${ids.join(', ')}) ORDER BY station_id
    FOR UPDATE${isWaiting ? '' : ' SKIP LOCKED'}`;
}

/**
 * A row of `stationsNowText`: a station, whether a shift of its clock stands, one of the tokens where it is in force (null: none is), fraction of the
 * bands, since when it takes intervals.
 */
export type StationNowCells = [number, 0 | 1, number | null, number, number | null];

/** The statement that answers how some stations are now, once for each of some tokens that is in force, or once where none of its is. */
export function stationsNowText(ids: readonly number[], tokenIds: readonly number[]): string {
  const isToken = tokenIds.length > 0 ? `station_tokens.id IN (${tokenIds.join(', ')})` : 'FALSE';
  return `SELECT stations.id, ${isShiftedText('stations.id')}, station_tokens.id, stations.band_fraction, stations.accepts_from
    FROM stations LEFT JOIN station_tokens ON station_tokens.station_id = stations.id AND ${isToken}
      AND station_tokens.revoked_at IS NULL AND stations.retired_at IS NULL
    WHERE stations.id IN (${ids.join(', ')})`;
}

/** Whether what was found by a token still is so. */
export function isStillSo(remembered: TokenStation, rows: readonly StationNowCells[]): boolean {
  return rows.some(
    ([id, , tokenId, bandFraction, acceptsFromSec]) =>
      tokenId === remembered.tokenId &&
      id === remembered.id &&
      bandFraction === remembered.bandFraction &&
      acceptsFromSec === remembered.acceptsFromSec,
  );
}

/** A row of `selectIntervalsOfText`: an interval, and its station. */
export type StationIntervalCells = [...IntervalCells, number];

/** The statement that reads every interval that overlaps one of some stretches, by station and time, each once. */
export function selectIntervalsOfText(stretches: readonly StationStretch[]): string {
  const ranges = stretches.map(
    ({ stationId, fromSec, toSec }) =>
      `(station_id = ${stationId} AND starts_at > ${fromSec - LONGEST_INTERVAL_SEC} AND starts_at < ${toSec}
        AND starts_at + duration_sec > ${fromSec})`,
  );
  return `SELECT ${INTERVAL_COLUMNS}, station_id FROM interval_levels FORCE INDEX (PRIMARY)
    WHERE ${ranges.join(' OR ')} ORDER BY station_id, starts_at`;
}
