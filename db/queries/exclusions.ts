import { pool, type Connection } from './connection';
import { runPrepared } from './prepared';

/** A period of a station that an operator has left out of statistics, with the reason. Half-open, epoch seconds. */
export interface ExclusionRow {
  id: number;
  networkId: number;
  stationId: number;
  stationCode: string;
  fromSec: number;
  toSec: number;
  reason: string;
  createdBy: string;
  createdByName: string | null;
  createdAt: Date;
  /** Number of the first exclusion of the act that made it at several stations; null: made alone. */
  actId: number | null;
  /** Null while it stands. */
  withdrawnAt: Date | null;
  withdrawnByName: string | null;
  withdrawalReason: string | null;
}

const COLUMNS = {
  id: 'exclusions.id',
  networkId: 'exclusions.network_id',
  stationId: 'exclusions.station_id',
  stationCode: 'stations.code',
  fromSec: 'exclusions.starts_at',
  toSec: 'exclusions.ends_at',
  reason: 'exclusions.reason',
  createdBy: 'exclusions.created_by',
  createdByName: 'creator.name',
  createdAt: 'exclusions.created_at',
  actId: 'exclusions.act_id',
  withdrawnAt: 'exclusions.withdrawn_at',
  withdrawnByName: 'withdrawer.name',
  withdrawalReason: 'exclusions.withdrawal_reason',
} as const;

function selectExclusions(conn: Connection) {
  return conn('exclusions')
    .join('stations', 'stations.id', 'exclusions.station_id')
    .leftJoin({ creator: 'users' }, 'creator.id', 'exclusions.created_by')
    .leftJoin({ withdrawer: 'users' }, 'withdrawer.id', 'exclusions.withdrawn_by')
    .select(COLUMNS);
}

/** A stretch of time, half-open, epoch seconds. */
export interface Span {
  fromSec: number;
  toSec: number;
}

const STANDING = `SELECT starts_at, ends_at FROM exclusions
  WHERE station_id = ? AND withdrawn_at IS NULL AND starts_at < ? AND ends_at > ? ORDER BY starts_at`;

/** Standing exclusions of a station that overlap `fromSec <= t < toSec`, by their beginning. */
export async function selectStandingExclusions(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<Span[]> {
  const [rows] = await runPrepared(conn, [{ statement: STANDING, cells: [stationId, toSec, fromSec] }]);
  return (rows as [number, number][]).map(([beginSec, endSec]) => ({ fromSec: beginSec, toSec: endSec }));
}

export async function findExclusion(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<ExclusionRow | undefined> {
  return selectExclusions(conn).where({ 'exclusions.network_id': networkId, 'exclusions.id': id }).first();
}

/** The same where it must be there. */
export async function readExclusion(networkId: number, id: number, conn: Connection): Promise<ExclusionRow> {
  const row = await findExclusion(networkId, id, conn);
  if (!row) throw new Error(`There is no exclusion ${id} in network ${networkId}.`);
  return row;
}

export interface ExclusionListQuery {
  networkId: number;
  /** Those that overlap this half-open period. */
  fromSec: number;
  toSec: number;
  stationId: number | null;
  limit: number;
  /** Beginning and id of the last one of the page before. */
  after: { fromSec: number; id: number } | null;
}

/** Exclusions of a network, withdrawn ones too, latest beginning first. */
export async function listExclusions(
  query: ExclusionListQuery,
  conn: Connection = pool(),
): Promise<ExclusionRow[]> {
  const { networkId, fromSec, toSec, stationId, limit, after } = query;
  const rows = selectExclusions(conn)
    .where('exclusions.network_id', networkId)
    .where('exclusions.starts_at', '<', toSec)
    .where('exclusions.ends_at', '>', fromSec)
    .orderBy([
      { column: 'exclusions.starts_at', order: 'desc' },
      { column: 'exclusions.id', order: 'desc' },
    ])
    .limit(limit);
  if (stationId !== null) rows.where('exclusions.station_id', stationId);
  if (after) {
    rows.whereRaw('(exclusions.starts_at, exclusions.id) < (?, ?)', [after.fromSec, after.id]);
  }
  return rows;
}

export interface NewExclusion extends Span {
  networkId: number;
  stationId: number;
  reason: string;
  createdBy: string;
}

/** Adds an exclusion and answers its id; `markQuartersOf` belongs in the same transaction. */
export async function insertExclusion(exclusion: NewExclusion, conn: Connection): Promise<number> {
  const [id] = await conn('exclusions').insert({
    network_id: exclusion.networkId,
    station_id: exclusion.stationId,
    starts_at: exclusion.fromSec,
    ends_at: exclusion.toSec,
    reason: exclusion.reason,
    created_by: exclusion.createdBy,
    created_at: new Date(),
  });
  return Number(id);
}

/** Notes that one act made some exclusions; it is named by the first of them, whose number is answered. */
export async function joinInAct(ids: readonly number[], conn: Connection): Promise<number> {
  const [actId] = ids;
  if (actId === undefined) throw new Error('An act makes at least one exclusion.');
  await conn('exclusions').whereIn('id', ids).update({ act_id: actId });
  return actId;
}

/** Exclusions that an act made, withdrawn ones too, in the order in which their stations are locked. */
export async function listExclusionsOfAct(
  networkId: number,
  actId: number,
  conn: Connection = pool(),
): Promise<ExclusionRow[]> {
  return selectExclusions(conn)
    .where({ 'exclusions.network_id': networkId, 'exclusions.act_id': actId })
    .orderBy('exclusions.station_id');
}

/** Withdraws an exclusion that stands; false when it was withdrawn before. */
export async function withdrawExclusion(
  id: number,
  withdrawal: { by: string; reason: string },
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('exclusions').where({ id }).whereNull('withdrawn_at').update({
    withdrawn_by: withdrawal.by,
    withdrawn_at: new Date(),
    withdrawal_reason: withdrawal.reason,
  });
  return changed === 1;
}
