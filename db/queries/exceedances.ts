import type { Cause } from '#lib/contracts/exceedances';
import { pool, type Connection } from './connection';
import { LONGEST_EXCEEDANCE_SEC } from './judgedExceedances';
import { RECORD_COLUMNS, type ExceedanceRecord } from './exceedanceRecords';

/** An exceedance with its station, the limit version that it is judged by, and who acknowledged it. */
export interface ExceedanceRow extends ExceedanceRecord {
  stationCode: string;
  stationName: string;
  limitId: number;
  limitVersionId: number;
  /** Number of that version within its limit. */
  limitVersion: number;
  /** How often what was found has changed since. */
  revision: number;
  detectedAt: Date;
  revisedAt: Date | null;
  cause: Cause | null;
  causeDetail: string | null;
  note: string | null;
  /** Null while nobody has acknowledged it. */
  acknowledgedAt: Date | null;
  acknowledgedByName: string | null;
}

/** Which exceedances are meant; what is left out does not matter. */
export interface ExceedanceFilter {
  /** Windows that overlap `fromSec <= t < toSec`. */
  fromSec?: number;
  toSec?: number;
  stationId?: number;
  limitId?: number;
  state?: 'standing' | 'lifted';
  isAcknowledged?: boolean;
}

/** A place in the list, which goes by the window's beginning, then by number. */
export interface ExceedancePlace {
  startsAtSec: number;
  id: number;
}

/** Exceedances of a network, latest window first. `after` is the last one of the page before. */
export async function listExceedances(
  networkId: number,
  filter: ExceedanceFilter,
  { limit, after }: { limit: number; after: ExceedancePlace | null },
  conn: Connection = pool(),
): Promise<ExceedanceRow[]> {
  const rows = selectExceedances(conn)
    .where('e.network_id', networkId)
    .modify(narrow, filter)
    .orderBy([
      { column: 'e.starts_at', order: 'desc' },
      { column: 'e.id', order: 'desc' },
    ])
    .limit(limit);
  if (after) void rows.whereRaw('(e.starts_at, e.id) < (?, ?)', [after.startsAtSec, after.id]);
  return rows;
}

export async function findExceedance(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<ExceedanceRow | undefined> {
  return selectExceedances(conn).where({ 'e.network_id': networkId, 'e.id': id }).first();
}

/** The same, locked until the transaction ends, so that the second of two people sees what the first one did. */
export async function lockExceedance(
  networkId: number,
  id: number,
  transaction: Connection,
): Promise<ExceedanceRow | undefined> {
  await transaction('exceedances').where({ network_id: networkId, id }).forUpdate().first('id');
  return findExceedance(networkId, id, transaction);
}

/** Numbers of the exceedances next to one in the list of a filter: the window before it in time and the one after. */
export async function findBeside(
  networkId: number,
  filter: ExceedanceFilter,
  { startsAtSec, id }: ExceedancePlace,
  conn: Connection = pool(),
): Promise<{ earlierId: number | null; laterId: number | null }> {
  const beside = async (sign: '<' | '>', order: 'asc' | 'desc') => {
    const row: { id: number } | undefined = await conn('exceedances as e')
      .where('e.network_id', networkId)
      .modify(narrow, filter)
      .whereRaw(`(e.starts_at, e.id) ${sign} (?, ?)`, [startsAtSec, id])
      .orderBy([
        { column: 'e.starts_at', order },
        { column: 'e.id', order },
      ])
      .first('e.id');
    return row?.id ?? null;
  };
  const [earlierId, laterId] = await Promise.all([beside('<', 'desc'), beside('>', 'asc')]);
  return { earlierId, laterId };
}

export interface ExceedanceCounts {
  all: number;
  standing: number;
  lifted: number;
  /** Standing and acknowledged by nobody. */
  open: number;
}

/** How many exceedances of a filter stand where. */
export async function countExceedances(
  networkId: number,
  filter: ExceedanceFilter,
  conn: Connection = pool(),
): Promise<ExceedanceCounts> {
  const row = await conn('exceedances as e')
    .where('e.network_id', networkId)
    .modify(narrow, filter)
    .first(
      conn.raw(
        `COUNT(*) AS allOfThem,
         COUNT(CASE WHEN e.state = 'standing' THEN 1 END) AS standing,
         COUNT(CASE WHEN e.state = 'standing' AND e.acknowledged_at IS NULL THEN 1 END) AS open`,
      ),
    );
  const [all, standing] = [Number(row.allOfThem), Number(row.standing)];
  return { all, standing, lifted: all - standing, open: Number(row.open) };
}

export interface AcknowledgementFields {
  cause: Cause | null;
  causeDetail: string | null;
  note: string;
  acknowledgedBy: string;
  acknowledgedAt: Date;
}

export async function updateAcknowledgement(
  id: number,
  fields: AcknowledgementFields,
  transaction: Connection,
): Promise<void> {
  await transaction('exceedances').where({ id }).update({
    cause: fields.cause,
    cause_detail: fields.causeDetail,
    note: fields.note,
    acknowledged_by: fields.acknowledgedBy,
    acknowledged_at: fields.acknowledgedAt,
  });
}

function narrow(query: ReturnType<Connection>, filter: ExceedanceFilter): void {
  const { fromSec, toSec, stationId, limitId, state, isAcknowledged } = filter;
  if (toSec !== undefined) void query.where('e.starts_at', '<', toSec);
  if (fromSec !== undefined) {
    // The key on the beginning bounds what is read.
    void query.where('e.starts_at', '>', fromSec - LONGEST_EXCEEDANCE_SEC).where('e.ends_at', '>', fromSec);
  }
  if (stationId !== undefined) void query.where('e.station_id', stationId);
  if (limitId !== undefined) void query.where('e.limit_id', limitId);
  if (state !== undefined) void query.where('e.state', state);
  if (isAcknowledged === true) void query.whereNotNull('e.acknowledged_at');
  if (isAcknowledged === false) void query.whereNull('e.acknowledged_at');
}

function selectExceedances(conn: Connection) {
  return conn('exceedances as e')
    .join('limit_versions as v', 'v.id', 'e.limit_version_id')
    .join('stations as s', 's.id', 'e.station_id')
    .leftJoin('users as u', 'u.id', 'e.acknowledged_by')
    .select({
      ...RECORD_COLUMNS,
      stationCode: 's.code',
      stationName: 's.name',
      limitId: 'e.limit_id',
      limitVersionId: 'e.limit_version_id',
      limitVersion: 'v.version',
      revision: 'e.revision',
      detectedAt: 'e.detected_at',
      revisedAt: 'e.revised_at',
      cause: 'e.cause',
      causeDetail: 'e.cause_detail',
      note: 'e.note',
      acknowledgedAt: 'e.acknowledged_at',
      acknowledgedByName: 'u.name',
    });
}
