import type { BandFraction } from '#lib/acoustics/bands';
import { pool, type Connection } from './connection';
import { LONGEST_EXCEEDANCE_SEC } from './judgedExceedances';
import type { LimitAveraging, LimitMetric } from './limits';

/** An exceedance with the limit version that it was judged by, as letters and summaries list it. */
export interface ExceedanceRecord {
  id: number;
  stationId: number;
  limitName: string;
  metric: LimitMetric;
  averaging: LimitAveraging;
  windowMin: number | null;
  stepMin: number | null;
  fromMin: number | null;
  toMin: number | null;
  bandFraction: BandFraction | null;
  bandIndex: number | null;
  percent: number | null;
  bandToIndex: number | null;
  eventTenths: number | null;
  backgroundFromMin: number | null;
  backgroundToMin: number | null;
  startsAtSec: number;
  endsAtSec: number;
  /** Of a rolling limit the loudest of the windows that make it: level and coverage are its. Else null. */
  loudestStartSec: number | null;
  loudestEndSec: number | null;
  levelDb: number;
  thresholdTenths: number;
  /** 0–1. */
  coverage: number;
  state: 'standing' | 'lifted';
}

/** Columns of `exceedances` as `e` and `limit_versions` as `v` that make an `ExceedanceRecord`. */
export const RECORD_COLUMNS = {
  id: 'e.id',
  stationId: 'e.station_id',
  limitName: 'v.name',
  metric: 'v.metric',
  averaging: 'v.averaging',
  windowMin: 'v.window_min',
  stepMin: 'v.step_min',
  fromMin: 'v.from_min',
  toMin: 'v.to_min',
  bandFraction: 'v.band_fraction',
  bandIndex: 'v.band_index',
  percent: 'v.percent',
  bandToIndex: 'v.band_to_index',
  eventTenths: 'v.event_tenths',
  backgroundFromMin: 'v.background_from_min',
  backgroundToMin: 'v.background_to_min',
  startsAtSec: 'e.starts_at',
  endsAtSec: 'e.ends_at',
  loudestStartSec: 'e.loudest_starts_at',
  loudestEndSec: 'e.loudest_ends_at',
  levelDb: 'e.level_db',
  thresholdTenths: 'e.threshold_tenths',
  coverage: 'e.coverage',
  state: 'e.state',
};

/** Exceedances of a station whose window overlaps `fromSec <= t < toSec`, in order of time. */
export async function listExceedancesOverlapping(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<ExceedanceRecord[]> {
  return selectRecords(conn)
    .where({ 'e.station_id': stationId })
    .where('e.starts_at', '<', toSec)
    .where('e.ends_at', '>', fromSec);
}

/** Ids of a network's stations with a standing exceedance whose window ended after an instant (epoch seconds). */
export async function listStationsOverLimit(
  networkId: number,
  endedAfterSec: number,
  conn: Connection = pool(),
): Promise<Set<number>> {
  // The key on its beginning bounds what is read.
  const rows: { stationId: number }[] = await conn('exceedances')
    .where({ network_id: networkId, state: 'standing' })
    .where('starts_at', '>', endedAfterSec - LONGEST_EXCEEDANCE_SEC)
    .where('ends_at', '>', endedAfterSec)
    .distinct({ stationId: 'station_id' });
  return new Set(rows.map(({ stationId }) => stationId));
}

function selectRecords(conn: Connection) {
  return conn('exceedances as e')
    .join('limit_versions as v', 'v.id', 'e.limit_version_id')
    .orderBy(['e.starts_at', 'e.id'])
    .select(RECORD_COLUMNS);
}
