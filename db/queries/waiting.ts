import { pool, type Connection } from './connection';

/** Exceedances of a network that stand and that nobody has acknowledged yet. */
export async function countOpenExceedances(networkId: number, conn: Connection = pool()): Promise<number> {
  const row = await conn('exceedances')
    .where({ network_id: networkId, state: 'standing', acknowledged_at: null })
    .count({ count: '*' })
    .first();
  return Number(row?.count ?? 0);
}

/** Complaints of a network that have not been answered yet. */
export async function countOpenComplaints(networkId: number, conn: Connection = pool()): Promise<number> {
  const row = await conn('complaints')
    .where({ network_id: networkId, status: 'open' })
    .count({ count: '*' })
    .first();
  return Number(row?.count ?? 0);
}

/** Refused records of a network that nobody has settled, counted up to `most`. */
export async function countOpenQuarantine(
  networkId: number,
  most: number,
  conn: Connection = pool(),
): Promise<number> {
  const rows = await conn('stations')
    .join('quarantine', 'quarantine.station_id', 'stations.id')
    .where({ 'stations.network_id': networkId, 'quarantine.settled_at': null })
    .limit(most)
    .select(conn.raw('1'));
  return rows.length;
}
