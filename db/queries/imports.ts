import { pool, type Connection } from './connection';

export type ImportState =
  | 'mapping'
  | 'checking'
  | 'checked'
  | 'storing'
  | 'stored'
  | 'undoing'
  | 'undone'
  | 'redoing'
  | 'discarding'
  | 'discarded'
  | 'failed';

/** States in which the worker has something to do. */
const WORKING_STATES: readonly ImportState[] = ['checking', 'storing', 'undoing', 'redoing', 'discarding'];

/** A file of intervals that somebody brings to a station. */
export interface ImportRow {
  id: number;
  networkId: number;
  stationId: number;
  stationCode: string;
  state: ImportState;
  problem: string | null;
  /** Name of the file in the data directory. */
  fileKey: string;
  fileName: string;
  fileBytes: number;
  /** JSON; null until somebody has said what the columns are. */
  mapping: string | null;
  createdBy: string;
  createdByName: string | null;
  createdAt: Date;
  /** Bytes of the file up to the last chunk that was committed, and its lines so far. */
  bytesDone: number;
  linesDone: number;
  startDone: number;
  /** JSON. */
  report: string;
  storedCount: number;
  lateKnownCount: number;
  lateRefusedCount: number;
  actedBy: string | null;
  actedByName: string | null;
  actedAt: Date | null;
  actReason: string | null;
  finishedAt: Date | null;
}

const COLUMNS = {
  id: 'imports.id',
  networkId: 'imports.network_id',
  stationId: 'imports.station_id',
  stationCode: 'stations.code',
  state: 'imports.state',
  problem: 'imports.problem',
  fileKey: 'imports.file_key',
  fileName: 'imports.file_name',
  fileBytes: 'imports.file_bytes',
  mapping: 'imports.mapping',
  createdBy: 'imports.created_by',
  createdByName: 'creator.name',
  createdAt: 'imports.created_at',
  bytesDone: 'imports.bytes_done',
  linesDone: 'imports.lines_done',
  startDone: 'imports.start_done',
  report: 'imports.report',
  storedCount: 'imports.stored_count',
  lateKnownCount: 'imports.late_known_count',
  lateRefusedCount: 'imports.late_refused_count',
  actedBy: 'imports.acted_by',
  actedByName: 'actor.name',
  actedAt: 'imports.acted_at',
  actReason: 'imports.act_reason',
  finishedAt: 'imports.finished_at',
} as const;

function selectImports(conn: Connection) {
  return conn('imports')
    .join('stations', 'stations.id', 'imports.station_id')
    .leftJoin({ creator: 'users' }, 'creator.id', 'imports.created_by')
    .leftJoin({ actor: 'users' }, 'actor.id', 'imports.acted_by')
    .select(COLUMNS);
}

export async function findImport(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<ImportRow | undefined> {
  return selectImports(conn).where({ 'imports.network_id': networkId, 'imports.id': id }).first();
}

/** A page of a network's imports, latest first; `beforeId` is the last one of the page before. */
export async function listImports(
  networkId: number,
  { limit, beforeId, stationId }: { limit: number; beforeId: number | null; stationId: number | null },
  conn: Connection = pool(),
): Promise<ImportRow[]> {
  const rows = selectImports(conn)
    .where('imports.network_id', networkId)
    .orderBy('imports.id', 'desc')
    .limit(limit);
  if (beforeId !== null) rows.where('imports.id', '<', beforeId);
  if (stationId !== null) rows.where('imports.station_id', stationId);
  return rows;
}

/** The oldest import that the worker has something to do for. */
export async function findWorkingImport(
  exceptIds: readonly number[] = [],
  conn: Connection = pool(),
): Promise<ImportRow | undefined> {
  return selectImports(conn)
    .whereIn('imports.state', WORKING_STATES)
    .whereNotIn('imports.id', [...exceptIds])
    .orderBy('imports.id')
    .first();
}

/** Locks an import until the transaction ends and reads it as it is then. */
export async function lockImport(id: number, transaction: Connection): Promise<ImportRow> {
  await transaction('imports').where({ id }).forUpdate().first('id');
  return selectImports(transaction).where({ 'imports.id': id }).first();
}

export interface NewImport {
  networkId: number;
  stationId: number;
  state: 'mapping' | 'checking';
  fileKey: string;
  fileName: string;
  fileBytes: number;
  fileDigest: Buffer;
  mapping: string | null;
  report: string;
  createdBy: string;
}

/** Adds an import and answers its id. */
export async function insertImport(added: NewImport, conn: Connection): Promise<number> {
  const [id] = await conn('imports').insert({
    network_id: added.networkId,
    station_id: added.stationId,
    state: added.state,
    file_key: added.fileKey,
    file_name: added.fileName,
    file_bytes: added.fileBytes,
    file_digest: added.fileDigest,
    mapping: added.mapping,
    report: added.report,
    created_by: added.createdBy,
    created_at: new Date(),
  });
  return Number(id);
}

const CHANGEABLE = {
  state: 'state',
  problem: 'problem',
  mapping: 'mapping',
  bytesDone: 'bytes_done',
  linesDone: 'lines_done',
  startDone: 'start_done',
  report: 'report',
  storedCount: 'stored_count',
  lateKnownCount: 'late_known_count',
  lateRefusedCount: 'late_refused_count',
  actedBy: 'acted_by',
  actedAt: 'acted_at',
  actReason: 'act_reason',
  finishedAt: 'finished_at',
} as const;

/** Changes an import; the caller holds `lockImport` and has looked at its state. */
export async function updateImport(
  id: number,
  changes: Partial<Pick<ImportRow, keyof typeof CHANGEABLE>>,
  transaction: Connection,
): Promise<void> {
  const columns = Object.entries(changes).map(([key, value]) => [
    CHANGEABLE[key as keyof typeof CHANGEABLE],
    value,
  ]);
  await transaction('imports').where({ id }).update(Object.fromEntries(columns));
}

/** Which of some files an import still needs. */
export async function neededFileKeys(
  keys: readonly string[],
  conn: Connection = pool(),
): Promise<Set<string>> {
  const needed: string[] = await conn('imports')
    .whereIn('file_key', keys)
    .whereNot('state', 'discarded')
    .pluck('file_key');
  return new Set(needed);
}

/** Whether an import of a station is storing intervals or taking them out. */
export async function isImportWorking(stationId: number, conn: Connection): Promise<boolean> {
  const row = await conn('imports')
    .where({ station_id: stationId })
    .whereIn('state', ['storing', 'undoing', 'redoing'])
    .first('id');
  return row !== undefined;
}
