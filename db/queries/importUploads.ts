import { pool, type Connection } from './connection';

/** A file that comes in parts and is no import yet. */
export interface ImportUploadRow {
  id: number;
  networkId: number;
  stationId: number;
  stationCode: string;
  /** Name of the file of its parts in the data directory. */
  fileKey: string;
  fileName: string;
  /** As announced. */
  fileBytes: number;
  /** Durable on disk, from the beginning of the file. */
  receivedBytes: number;
  /** SHA-256 of the unpacked file; null where the sender did not announce it. */
  fileDigest: Buffer | null;
  mark: string | null;
  createdBy: string;
  createdByName: string | null;
  createdAt: Date;
  touchedAt: Date;
  /** What it became; null while it is not finished. */
  importId: number | null;
}

function selectUploads(conn: Connection) {
  return conn('import_uploads')
    .join('stations', 'stations.id', 'import_uploads.station_id')
    .leftJoin({ creator: 'users' }, 'creator.id', 'import_uploads.created_by')
    .select({
      id: 'import_uploads.id',
      networkId: 'import_uploads.network_id',
      stationId: 'import_uploads.station_id',
      stationCode: 'stations.code',
      fileKey: 'import_uploads.file_key',
      fileName: 'import_uploads.file_name',
      fileBytes: 'import_uploads.file_bytes',
      receivedBytes: 'import_uploads.received_bytes',
      fileDigest: 'import_uploads.file_digest',
      mark: 'import_uploads.mark',
      createdBy: 'import_uploads.created_by',
      createdByName: 'creator.name',
      createdAt: 'import_uploads.created_at',
      touchedAt: 'import_uploads.touched_at',
      importId: 'import_uploads.import_id',
    });
}

export async function findUpload(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<ImportUploadRow | undefined> {
  return selectUploads(conn)
    .where({ 'import_uploads.network_id': networkId, 'import_uploads.id': id })
    .first();
}

/** Locks an upload until the transaction ends and reads it as it is then. */
export async function lockUpload(
  networkId: number,
  id: number,
  transaction: Connection,
): Promise<ImportUploadRow | undefined> {
  await transaction('import_uploads').where({ id }).forUpdate().first('id');
  return findUpload(networkId, id, transaction);
}

/** Uploads of a network that are not finished, latest first. */
export async function listUnfinishedUploads(
  networkId: number,
  conn: Connection = pool(),
): Promise<ImportUploadRow[]> {
  return selectUploads(conn)
    .where({ 'import_uploads.network_id': networkId, 'import_uploads.import_id': null })
    .orderBy('import_uploads.id', 'desc');
}

export type NewUpload = Pick<
  ImportUploadRow,
  'networkId' | 'stationId' | 'fileKey' | 'fileName' | 'fileBytes' | 'fileDigest' | 'mark' | 'createdBy'
>;

/** Adds an upload of which nothing has come yet, and answers its id. */
export async function insertUpload(added: NewUpload, now: Date, conn: Connection): Promise<number> {
  const [id] = await conn('import_uploads').insert({
    network_id: added.networkId,
    station_id: added.stationId,
    file_key: added.fileKey,
    file_name: added.fileName,
    file_bytes: added.fileBytes,
    file_digest: added.fileDigest,
    mark: added.mark,
    created_by: added.createdBy,
    created_at: now,
    touched_at: now,
  });
  return Number(id);
}

/** Notes how much of a file is on disk, or what it became; the caller holds `lockUpload`. */
export async function updateUpload(
  id: number,
  { receivedBytes, importId }: Partial<Pick<ImportUploadRow, 'receivedBytes' | 'importId'>>,
  now: Date,
  transaction: Connection,
): Promise<void> {
  await transaction('import_uploads')
    .where({ id })
    .update({
      ...(receivedBytes === undefined ? {} : { received_bytes: receivedBytes }),
      ...(importId === undefined ? {} : { import_id: importId }),
      touched_at: now,
    });
}

export async function deleteUpload(id: number, transaction: Connection): Promise<void> {
  await transaction('import_uploads').where({ id }).delete();
}

/** Forgets uploads, finished or not, to which nothing has come since `before`. @returns how many. */
export async function deleteUploadsBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('import_uploads').where('touched_at', '<', before).delete();
}

/** Which of some files of parts an unfinished upload still needs. */
export async function neededPartKeys(
  keys: readonly string[],
  conn: Connection = pool(),
): Promise<Set<string>> {
  const needed: string[] = await conn('import_uploads')
    .whereIn('file_key', keys)
    .whereNull('import_id')
    .pluck('file_key');
  return new Set(needed);
}
