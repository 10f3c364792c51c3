import { pool, type Connection } from './connection';
import { LONGEST_EXCEEDANCE_SEC } from './judgedExceedances';

/** A stretch of time for which a limit stands exceeded at a station. */
export interface ExceededSpan {
  stationId: number;
  fromSec: number;
  toSec: number;
}

/** Windows of a network's standing exceedances that overlap `fromSec <= t < toSec`, in order of time. */
export async function selectExceededSpans(
  networkId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<ExceededSpan[]> {
  // The key on its beginning bounds what is read.
  return conn('exceedances')
    .where({ network_id: networkId, state: 'standing' })
    .where('starts_at', '>', fromSec - LONGEST_EXCEEDANCE_SEC)
    .where('starts_at', '<', toSec)
    .where('ends_at', '>', fromSec)
    .orderBy(['starts_at', 'id'])
    .select({ stationId: 'station_id', fromSec: 'starts_at', toSec: 'ends_at' });
}

/** How many of a network's standing exceedances overlap `fromSec <= t < toSec`, by station. */
export async function countExceedancesByStation(
  networkId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<Map<number, number>> {
  const rows: { stationId: number; count: number }[] = await conn('exceedances')
    .where({ network_id: networkId, state: 'standing' })
    .where('starts_at', '>', fromSec - LONGEST_EXCEEDANCE_SEC)
    .where('starts_at', '<', toSec)
    .where('ends_at', '>', fromSec)
    .groupBy('station_id')
    .select({ stationId: 'station_id', count: conn.raw('COUNT(*)') });
  return new Map(rows.map(({ stationId, count }) => [stationId, Number(count)]));
}
