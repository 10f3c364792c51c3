import type { ComplaintRow } from './complaints';
import { pool, type Connection } from './connection';

/** What is needed to tell which complaints are near each other, without anything personal. */
export type ComplaintAround = Pick<
  ComplaintRow,
  'id' | 'kind' | 'coarseLatitude' | 'coarseLongitude' | 'nearestStationId'
>;

/** Complaints of a network whose windows overlap `fromSec <= t < toSec`; those that were the same report again do not count. */
export async function listComplaintsAround(
  networkId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection = pool(),
): Promise<ComplaintAround[]> {
  return conn('complaints')
    .where({ network_id: networkId })
    .where('starts_at', '<', toSec)
    .where('ends_at', '>', fromSec)
    .where((query) => query.whereNull('closing_reason').orWhereNot({ closing_reason: 'repeated' }))
    .select({
      id: 'id',
      kind: 'kind',
      coarseLatitude: 'coarse_latitude',
      coarseLongitude: 'coarse_longitude',
      nearestStationId: 'nearest_station_id',
    });
}
