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
  return `SELECT id FROM stations FORCE INDEX (PRIMARY) WHERE id IN (${ids.join(', ')}) ORDER BY id
    FOR UPDATE${isWaiting ? '' : ' SKIP LOCKED'}`;
}

/** A row of `tokensInForceText`: token, station, fraction of its bands, since when it takes intervals. */
export type TokenCells = [number, number, number, number | null];

/** The statement that answers what some tokens stand for, where they and their stations are in force. */
export function tokensInForceText(tokenIds: readonly number[]): string {
  return `SELECT station_tokens.id, stations.id, stations.band_fraction, stations.accepts_from
    FROM station_tokens JOIN stations ON stations.id = station_tokens.station_id
    WHERE station_tokens.id IN (${tokenIds.join(', ')})
      AND station_tokens.revoked_at IS NULL AND stations.retired_at IS NULL`;
}

/** Whether what was found by a token still is so. */
export function isStillSo(remembered: TokenStation, rows: readonly TokenCells[]): boolean {
  return rows.some(
    ([tokenId, id, bandFraction, acceptsFromSec]) =>
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
