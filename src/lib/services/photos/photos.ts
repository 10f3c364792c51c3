import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import {
  deletePhoto,
  findPhoto,
  insertPhoto,
  isPhotoFile,
  listPhotos,
  type PhotoRow,
} from '#db/queries/stationPhotos';
import { lockStation, type StationRow } from '#db/queries/stations';
import { MOST_PHOTOS, type NewPhoto, type Photo, type PhotoType } from '#lib/contracts/photos';
import { keepFile, readKeptFile, removeKeptFile } from '../files/keptFile';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { plainPhoto } from './plainPhoto';

const NO_PHOTO = unknown('The station has no such photo.');

/** Photos of a station, latest taken first. */
export async function photosOf(stationId: number): Promise<Photo[]> {
  return (await listPhotos(stationId)).map(photoJson);
}

/** A photo's picture; null when there is none. */
export async function pictureOf(
  stationId: number,
  id: number,
): Promise<{ bytes: Buffer; type: string } | null> {
  const photo = await findPhoto(stationId, id);
  const bytes = photo ? await readKeptFile('photos', photo.sha256) : null;
  return photo && bytes ? { bytes, type: photo.mediaType } : null;
}

export interface PhotoAct {
  station: StationRow;
  userId: string;
}

/** Keeps a photo of a station, without what the file tells beside the picture. The audit entry holds no caption. */
export async function addPhoto(
  { station, userId }: PhotoAct,
  { caption, takenOn }: NewPhoto,
  bytes: Uint8Array,
): Promise<Outcome<Photo>> {
  const photo = plainPhoto(bytes);
  if (!photo) return invalid('photo', 'must be a whole JPEG or PNG file');
  return inTransaction<Outcome<Photo>>(async (transaction) => {
    await lockStation(station.id, transaction);
    const before = await listPhotos(station.id, transaction);
    if (before.length >= MOST_PHOTOS) {
      return invalid(
        'photo',
        `would be one too many: a station has at most ${MOST_PHOTOS}. Delete one first.`,
      );
    }
    const sha256 = await keepFile('photos', photo.bytes);
    const row = { stationId: station.id, takenOn, caption, mediaType: photo.type, sha256 };
    const id = await insertPhoto({ ...row, byteCount: photo.bytes.length }, userId, transaction);
    const detail = { photo: id, takenOn, sha256: sha256.toString('hex') };
    await appendAudit(
      {
        userId,
        networkId: station.networkId,
        action: 'photo.add',
        subject: `station ${station.code}`,
        detail,
      },
      transaction,
    );
    const added = await findPhoto(station.id, id, transaction);
    return added ? done(photoJson(added)) : NO_PHOTO;
  });
}

/** Deletes a photo for good, its file too where no other photo is the same. */
export async function removePhoto({ station, userId }: PhotoAct, id: number): Promise<Outcome<null>> {
  const photo = await findPhoto(station.id, id);
  if (!photo) return NO_PHOTO;
  const outcome = await inTransaction<Outcome<null>>(async (transaction) => {
    if (!(await deletePhoto(station.id, id, transaction))) return NO_PHOTO;
    const detail = { photo: id, takenOn: photo.takenOn, sha256: photo.sha256.toString('hex') };
    await appendAudit(
      {
        userId,
        networkId: station.networkId,
        action: 'photo.delete',
        subject: `station ${station.code}`,
        detail,
      },
      transaction,
    );
    return done(null);
  });
  if (outcome.kind === 'done' && !(await isPhotoFile(photo.sha256))) {
    await removeKeptFile('photos', photo.sha256);
  }
  return outcome;
}

function photoJson(row: PhotoRow): Photo {
  return {
    id: row.id,
    caption: row.caption,
    takenOn: row.takenOn,
    type: row.mediaType as PhotoType,
    bytes: row.byteCount,
    uploadedAt: row.uploadedAt.toISOString(),
    uploadedBy: row.uploadedByName,
  };
}
