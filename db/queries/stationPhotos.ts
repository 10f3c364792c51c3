import { pool, type Connection } from './connection';

export interface PhotoRow {
  id: number;
  stationId: number;
  /** Civil date. */
  takenOn: string;
  caption: string;
  mediaType: string;
  byteCount: number;
  /** Of the file as kept. */
  sha256: Buffer;
  uploadedAt: Date;
  uploadedByName: string | null;
}

const COLUMNS = {
  id: 'photos.id',
  stationId: 'photos.station_id',
  takenOn: 'photos.taken_on',
  caption: 'photos.caption',
  mediaType: 'photos.media_type',
  byteCount: 'photos.byte_count',
  sha256: 'photos.sha256',
  uploadedAt: 'photos.uploaded_at',
  uploadedByName: 'users.name',
} as const;

function selectPhotos(stationId: number, conn: Connection) {
  return conn({ photos: 'station_photos' })
    .leftJoin('users', 'users.id', 'photos.uploaded_by')
    .where('photos.station_id', stationId)
    .select(COLUMNS);
}

/** Photos of a station, latest taken first. */
export async function listPhotos(stationId: number, conn: Connection = pool()): Promise<PhotoRow[]> {
  return selectPhotos(stationId, conn).orderBy([
    { column: 'photos.taken_on', order: 'desc' },
    { column: 'photos.id', order: 'desc' },
  ]);
}

export async function findPhoto(
  stationId: number,
  id: number,
  conn: Connection = pool(),
): Promise<PhotoRow | undefined> {
  return selectPhotos(stationId, conn).where('photos.id', id).first();
}

export type NewPhotoRow = Pick<
  PhotoRow,
  'stationId' | 'takenOn' | 'caption' | 'mediaType' | 'byteCount' | 'sha256'
>;

/** Adds a photo and answers its id. */
export async function insertPhoto(photo: NewPhotoRow, uploadedBy: string, conn: Connection): Promise<number> {
  const [id] = await conn('station_photos').insert({
    station_id: photo.stationId,
    taken_on: photo.takenOn,
    caption: photo.caption,
    media_type: photo.mediaType,
    byte_count: photo.byteCount,
    sha256: photo.sha256,
    uploaded_by: uploadedBy,
    uploaded_at: new Date(),
  });
  return Number(id);
}

/** Deletes a photo; false when it is gone already. */
export async function deletePhoto(stationId: number, id: number, conn: Connection): Promise<boolean> {
  return (await conn('station_photos').where({ station_id: stationId, id }).delete()) === 1;
}

/** Whether any photo of any station is kept in this file. */
export async function isPhotoFile(sha256: Buffer, conn: Connection = pool()): Promise<boolean> {
  return (await conn('station_photos').where({ sha256 }).first('id')) !== undefined;
}
