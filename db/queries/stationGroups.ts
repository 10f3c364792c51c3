import { pool, type Connection } from './connection';

/** A named group of a network's stations, which limits may apply to. */
export interface StationGroup {
  id: number;
  name: string;
  /** As they are now, ascending. */
  stationIds: number[];
  changedAt: Date;
  changedByName: string | null;
}

interface Row extends Omit<StationGroup, 'stationIds'> {
  stationIds: string | number[];
}

/** Groups of a network by name. */
export async function listStationGroups(
  networkId: number,
  conn: Connection = pool(),
): Promise<StationGroup[]> {
  const rows: Row[] = await conn('station_groups as g')
    .leftJoin('users as u', 'u.id', 'g.changed_by')
    .where({ 'g.network_id': networkId })
    .orderBy(['g.name', 'g.id'])
    .select({
      id: 'g.id',
      name: 'g.name',
      stationIds: 'g.station_ids',
      changedAt: 'g.changed_at',
      changedByName: 'u.name',
    });
  return rows.map((row) => ({ ...row, stationIds: parsed(row.stationIds) }));
}

/**
 * Locks the groups of a network until the transaction ends: who changes them and who sets limits by them take turns. To be asked for
 * before limits are locked.
 */
export async function lockStationGroups(networkId: number, transaction: Connection): Promise<void> {
  await transaction('station_groups').where({ network_id: networkId }).orderBy('id').forUpdate().select('id');
}

/** A group as it is written. */
export interface StationGroupFields {
  name: string;
  stationIds: readonly number[];
  changedBy: string;
}

/** Adds a group and answers its id. */
export async function insertStationGroup(
  networkId: number,
  fields: StationGroupFields,
  transaction: Connection,
): Promise<number> {
  const [id] = await transaction('station_groups').insert({ network_id: networkId, ...columnsOf(fields) });
  return Number(id);
}

export async function updateStationGroup(
  groupId: number,
  fields: StationGroupFields,
  transaction: Connection,
): Promise<void> {
  await transaction('station_groups').where({ id: groupId }).update(columnsOf(fields));
}

export async function deleteStationGroup(groupId: number, transaction: Connection): Promise<void> {
  await transaction('station_groups').where({ id: groupId }).delete();
}

function columnsOf({ name, stationIds, changedBy }: StationGroupFields) {
  return { name, station_ids: JSON.stringify(stationIds), changed_by: changedBy, changed_at: new Date() };
}

/** The driver gives JSON columns as text or parsed, depending on the server's version. */
function parsed(value: string | number[]): number[] {
  return typeof value === 'string' ? (JSON.parse(value) as number[]) : value;
}
