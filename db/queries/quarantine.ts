import { createHash } from 'node:crypto';
import { insertRows, pool, type Connection, type Writes } from './connection';

/** A refused record, kept for the operator with its reason. */
export interface NewQuarantined {
  code: string;
  detail: string;
  /** JSON of the record with its post's bands. */
  record: string;
  startSec: number | null;
}

const ROWS_A_STATEMENT = 100;

/** Keeps refused records. The same record refused again for the same reason is counted, not kept twice. */
export async function insertQuarantined(
  stationId: number,
  records: readonly NewQuarantined[],
  receivedAt: Date,
  conn: Writes,
): Promise<void> {
  await insertRecords(stationId, records, receivedAt, null, conn);
}

/** Keeps the refused records of an import, so that undoing it can take them away again; what is kept already stays as it is. */
export async function insertQuarantinedOfImport(
  importId: number,
  stationId: number,
  records: readonly NewQuarantined[],
  receivedAt: Date,
  conn: Writes,
): Promise<void> {
  await insertRecords(stationId, records, receivedAt, importId, conn);
}

async function insertRecords(
  stationId: number,
  records: readonly NewQuarantined[],
  receivedAt: Date,
  importId: number | null,
  conn: Writes,
): Promise<void> {
  for (let first = 0; first < records.length; first += ROWS_A_STATEMENT) {
    const part = records.slice(first, first + ROWS_A_STATEMENT);
    await insertRows(conn, {
      head: `INSERT INTO quarantine
         (station_id, code, detail, record, record_digest, starts_at, received_at, import_id)`,
      rows: part.map(() => '(?, ?, ?, ?, ?, ?, ?, ?)'),
      tail: `ON DUPLICATE KEY UPDATE times_received = times_received + ${importId === null ? 1 : 0}`,
      bindings: part.flatMap(({ code, detail, record, startSec }) => [
        stationId,
        code,
        detail.slice(0, 500),
        record,
        digestOf(record),
        startSec,
        receivedAt,
        importId,
      ]),
    });
  }
}

const digestOf = (record: string) => createHash('sha256').update(record).digest();

export type Settlement = 'released' | 'dismissed' | 'superseded';
export type QuarantineState = 'open' | Settlement;

/** A record in quarantine; open while nobody has settled it. */
export interface QuarantineRow {
  id: number;
  stationId: number;
  stationCode: string;
  code: string;
  detail: string;
  record: string;
  startSec: number | null;
  receivedAt: Date;
  timesReceived: number;
  importId: number | null;
  settlement: Settlement | null;
  settledAt: Date | null;
  settledByName: string | null;
  settlementReason: string | null;
}

const LISTED_COLUMNS = {
  id: 'quarantine.id',
  stationId: 'quarantine.station_id',
  stationCode: 'stations.code',
  code: 'quarantine.code',
  detail: 'quarantine.detail',
  startSec: 'quarantine.starts_at',
  receivedAt: 'quarantine.received_at',
  timesReceived: 'quarantine.times_received',
  importId: 'quarantine.import_id',
  settlement: 'quarantine.settlement',
  settledAt: 'quarantine.settled_at',
  settledByName: 'users.name',
  settlementReason: 'quarantine.settlement_reason',
} as const;
const COLUMNS = { ...LISTED_COLUMNS, record: 'quarantine.record' } as const;

/** A record as a list has it: without what was received. */
export type ListedQuarantined = Omit<QuarantineRow, 'record'>;

/** Which records of a network; null: any. A record whose start could not be read is in no period. */
export interface QuarantineFilter {
  networkId: number;
  stationId: number | null;
  code: string | null;
  state: QuarantineState | null;
  /** Claimed start, half-open. */
  period: { fromSec: number; toSec: number } | null;
}

function matching({ networkId, stationId, code, state, period }: QuarantineFilter, conn: Connection) {
  const rows = conn('quarantine')
    .join('stations', 'stations.id', 'quarantine.station_id')
    .where('stations.network_id', networkId);
  if (stationId !== null) rows.where('quarantine.station_id', stationId);
  if (code !== null) rows.where('quarantine.code', code);
  if (state === 'open') rows.whereNull('quarantine.settled_at');
  else if (state !== null) rows.where('quarantine.settlement', state);
  if (period) {
    rows.where('quarantine.starts_at', '>=', period.fromSec).where('quarantine.starts_at', '<', period.toSec);
  }
  return rows;
}

/** A page of records, latest kept first; `beforeId` is the last one of the page before. */
export async function listQuarantined(
  filter: QuarantineFilter,
  { limit, beforeId }: { limit: number; beforeId: number | null },
  conn: Connection = pool(),
): Promise<ListedQuarantined[]> {
  const rows = matching(filter, conn)
    .leftJoin('users', 'users.id', 'quarantine.settled_by')
    .orderBy('quarantine.id', 'desc')
    .limit(limit)
    .select(LISTED_COLUMNS);
  if (beforeId !== null) rows.where('quarantine.id', '<', beforeId);
  return rows;
}

export async function countQuarantined(filter: QuarantineFilter, conn: Connection = pool()): Promise<number> {
  const row = await matching(filter, conn).count({ count: '*' }).first();
  return Number(row?.count ?? 0);
}

/** The oldest records that match, by station: what an act on all of them takes next. */
export async function listQuarantinedIds(
  filter: QuarantineFilter,
  { limit, afterId }: { limit: number; afterId: number },
  conn: Connection = pool(),
): Promise<{ id: number; stationId: number }[]> {
  return matching(filter, conn)
    .where('quarantine.id', '>', afterId)
    .orderBy('quarantine.id')
    .limit(limit)
    .select({ id: 'quarantine.id', stationId: 'quarantine.station_id' });
}

/** Which of some ids a network has, by station. */
export async function stationsOfQuarantined(
  networkId: number,
  ids: readonly number[],
  conn: Connection = pool(),
): Promise<{ id: number; stationId: number }[]> {
  return conn('quarantine')
    .join('stations', 'stations.id', 'quarantine.station_id')
    .where('stations.network_id', networkId)
    .whereIn('quarantine.id', ids)
    .orderBy('quarantine.id')
    .select({ id: 'quarantine.id', stationId: 'quarantine.station_id' });
}

export async function findQuarantined(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<QuarantineRow | undefined> {
  return conn('quarantine')
    .join('stations', 'stations.id', 'quarantine.station_id')
    .leftJoin('users', 'users.id', 'quarantine.settled_by')
    .where({ 'stations.network_id': networkId, 'quarantine.id': id })
    .first(COLUMNS);
}

/** What releasing reads of a record. */
export type LockedQuarantined = Pick<QuarantineRow, 'id' | 'record' | 'receivedAt' | 'settlement'>;

/** Records of a station that have one of some states, oldest first, locked until the transaction ends. */
export async function lockQuarantined(
  stationId: number,
  ids: readonly number[],
  states: readonly QuarantineState[],
  transaction: Connection,
): Promise<LockedQuarantined[]> {
  const rows: LockedQuarantined[] = await transaction('quarantine')
    .where({ station_id: stationId })
    .whereIn('id', ids)
    .orderBy('id')
    .forUpdate()
    .select({ id: 'id', record: 'record', receivedAt: 'received_at', settlement: 'settlement' });
  return rows.filter(({ settlement }) => states.includes(settlement ?? 'open'));
}

/** Settles records, or opens them again (`null`). Their states are the caller's to check, under `lockQuarantined`. */
export async function settleQuarantined(
  ids: readonly number[],
  settlement: { as: Settlement; by: string; reason: string | null } | null,
  transaction: Connection,
): Promise<void> {
  await transaction('quarantine')
    .whereIn('id', ids)
    .update({
      settlement: settlement?.as ?? null,
      settled_at: settlement ? new Date() : null,
      settled_by: settlement?.by ?? null,
      settlement_reason: settlement?.reason ?? null,
    });
}

/** Keeps an interval that a released conflict replaces, as a record that can be put back. @returns its id. */
export async function insertSuperseded(
  stationId: number,
  { detail, record, startSec }: Omit<NewQuarantined, 'code'>,
  settlement: { by: string; reason: string; receivedAt: Date },
  transaction: Connection,
): Promise<number> {
  const { by, reason, receivedAt } = settlement;
  const key = { station_id: stationId, code: 'superseded', record_digest: digestOf(record) };
  const settled = {
    detail: detail.slice(0, 500),
    settlement: 'superseded',
    settled_at: new Date(),
    settled_by: by,
    settlement_reason: reason,
  };
  // It may have been replaced and put back before.
  await transaction('quarantine')
    .insert({ ...key, ...settled, record, starts_at: startSec, received_at: receivedAt })
    .onConflict()
    .merge(settled);
  const row = await transaction('quarantine').where(key).first('id');
  return Number(row.id);
}

/** Takes one interval of a station out of the stored ones. */
export async function deleteInterval(
  stationId: number,
  startSec: number,
  transaction: Connection,
): Promise<void> {
  await transaction('interval_levels').where({ station_id: stationId, starts_at: startSec }).delete();
}
