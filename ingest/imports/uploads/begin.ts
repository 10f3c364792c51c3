import { randomUUID } from 'node:crypto';
import { inTransaction } from '#db/queries/connection';
import { findUpload, insertUpload, listUnfinishedUploads, lockUpload } from '#db/queries/importUploads';
import { type StationRow } from '#db/queries/stations';
import { type NewUpload, type Upload } from '#lib/contracts/importUploads';
import { config } from '#lib/config/index';
import { tooLarge } from '../files';
import { shownName } from '../open';
import { uploadJson } from './uploadJson';

/** Unfinished uploads that a network may have, so that files nobody finishes do not fill the disk. */
const MOST_UNFINISHED = 20;

export type BeginOutcome =
  | { kind: 'begun'; upload: Upload }
  | { kind: 'begun-before'; upload: Upload }
  | { kind: 'too-many'; message: string };

/**
 * Begins to take a file in parts, or finds what the same person began under the same mark for the same station and size.
 * @throws {UnusableFile} when it announces more bytes than a file may have.
 */
export async function beginUpload(
  { networkId, station, userId }: { networkId: number; station: StationRow; userId: string },
  { name, bytes, mark, sha256 }: NewUpload,
): Promise<BeginOutcome> {
  if (bytes > config().importMostBytes) throw tooLarge();
  const unfinished = await listUnfinishedUploads(networkId);
  const same = unfinished.find(
    (one) =>
      mark !== null &&
      one.mark === mark &&
      one.stationId === station.id &&
      one.fileBytes === bytes &&
      one.createdBy === userId,
  );
  if (same) return { kind: 'begun-before', upload: uploadJson(same) };
  if (unfinished.length >= MOST_UNFINISHED) {
    return {
      kind: 'too-many',
      message: `The network has ${unfinished.length} uploads that are not finished. Finish one or give one up.`,
    };
  }
  return inTransaction(async (transaction) => {
    const fileDigest = sha256 === null ? null : Buffer.from(sha256, 'hex');
    const file = { fileKey: randomUUID(), fileName: shownName(name), fileBytes: bytes, fileDigest };
    const owner = { networkId, stationId: station.id, createdBy: userId };
    const id = await insertUpload({ ...owner, ...file, mark }, new Date(), transaction);
    const row = await lockUpload(networkId, id, transaction);
    if (!row) throw new Error('The upload that was added is not there.');
    return { kind: 'begun', upload: uploadJson(row) };
  });
}

/** Uploads of a network that are not finished, latest first. */
export async function unfinishedUploads(networkId: number): Promise<Upload[]> {
  return (await listUnfinishedUploads(networkId)).map(uploadJson);
}

/** One upload of a network, finished or not; null when there is none of this number. */
export async function uploadOf(networkId: number, id: number): Promise<Upload | null> {
  const row = await findUpload(networkId, id);
  return row ? uploadJson(row) : null;
}
