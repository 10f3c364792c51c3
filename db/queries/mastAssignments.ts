import { pool, type Connection } from './connection';

/** A stretch of time in which a mast tells the weather of a station: half-open, epoch seconds. */
export interface MastAssignment {
  id: number;
  stationId: number;
  stationCode: string;
  stationName: string;
  mastId: number;
  mastCode: string;
  mastName: string;
  /** Of the mast: how far from an interval its records may lie. */
  maximumAgeSec: number;
  fromSec: number;
  /** Null: it goes on. */
  toSec: number | null;
  createdByName: string | null;
}

function selectAssignments(conn: Connection) {
  return conn('mast_assignments')
    .join('masts', 'masts.id', 'mast_assignments.mast_id')
    .join('stations', 'stations.id', 'mast_assignments.station_id')
    .leftJoin({ creator: 'users' }, 'creator.id', 'mast_assignments.created_by')
    .select({
      id: 'mast_assignments.id',
      stationId: 'mast_assignments.station_id',
      stationCode: 'stations.code',
      stationName: 'stations.name',
      mastId: 'mast_assignments.mast_id',
      mastCode: 'masts.code',
      mastName: 'masts.name',
      maximumAgeSec: 'masts.maximum_age_sec',
      fromSec: 'mast_assignments.starts_at',
      toSec: 'mast_assignments.ends_at',
      createdByName: 'creator.name',
    });
}

/** Every assignment of a network, by station and beginning, latest first. */
export async function listAssignments(
  networkId: number,
  conn: Connection = pool(),
): Promise<MastAssignment[]> {
  return selectAssignments(conn)
    .where('mast_assignments.network_id', networkId)
    .orderBy([{ column: 'stations.code' }, { column: 'mast_assignments.starts_at', order: 'desc' }]);
}

export async function findAssignment(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<MastAssignment | undefined> {
  return selectAssignments(conn)
    .where({ 'mast_assignments.network_id': networkId, 'mast_assignments.id': id })
    .first();
}

/** Assignments of a station that overlap `fromSec <= t < toSec`, ascending; a `toSec` of null has no end. */
export async function selectAssignmentsOf(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number | null },
  conn: Connection = pool(),
): Promise<MastAssignment[]> {
  const rows = selectAssignments(conn)
    .where('mast_assignments.station_id', stationId)
    .where((open) =>
      open.whereNull('mast_assignments.ends_at').orWhere('mast_assignments.ends_at', '>', fromSec),
    )
    .orderBy('mast_assignments.starts_at');
  if (toSec !== null) rows.where('mast_assignments.starts_at', '<', toSec);
  return rows;
}

/** Assignments of a mast that overlap `fromSec <= t < toSec`, by station, so that locks are always taken in one order. */
export async function selectAssignmentsTo(
  mastId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection = pool(),
): Promise<MastAssignment[]> {
  return selectAssignments(conn)
    .where('mast_assignments.mast_id', mastId)
    .where('mast_assignments.starts_at', '<', toSec)
    .where((open) =>
      open.whereNull('mast_assignments.ends_at').orWhere('mast_assignments.ends_at', '>', fromSec),
    )
    .orderBy(['mast_assignments.station_id', 'mast_assignments.starts_at']);
}

/** Adds an assignment and answers its id; the caller holds the locks of mast and station. */
export async function insertAssignment(
  assignment: Pick<MastAssignment, 'stationId' | 'mastId' | 'fromSec' | 'toSec'> & {
    networkId: number;
    createdBy: string;
  },
  conn: Connection,
): Promise<number> {
  const [id] = await conn('mast_assignments').insert({
    network_id: assignment.networkId,
    station_id: assignment.stationId,
    mast_id: assignment.mastId,
    starts_at: assignment.fromSec,
    ends_at: assignment.toSec,
    created_by: assignment.createdBy,
    created_at: new Date(),
  });
  return Number(id);
}

/** Gives an assignment its end. */
export async function endAssignment(
  id: number,
  end: { toSec: number; by: string },
  conn: Connection,
): Promise<void> {
  await conn('mast_assignments').where({ id }).update({ ends_at: end.toSec, ended_by: end.by });
}
