import { createReadStream } from 'node:fs';
import { rm } from 'node:fs/promises';
import { findUpload, lockUpload, updateUpload, type ImportUploadRow } from '#db/queries/importUploads';
import { findStationById } from '#db/queries/stations';
import { type Import } from '#lib/contracts/imports';
import { importOf } from '#lib/services/imports/list';
import { partPath } from '../files';
import { openImport } from '../open';

export type FinishOutcome =
  | { kind: 'done'; import: Import }
  | { kind: 'unknown' }
  | { kind: 'incomplete'; offset: number; message: string };

interface Asked {
  networkId: number;
  id: number;
  userId: string;
  /** Zone of the network, for times without an offset. */
  zone: string;
}

/** Another request has made the import meanwhile. */
class FinishedMeanwhile extends Error {}

/**
 * Makes an import of an upload whose parts are all here; asked again, or twice at once, it answers the same import.
 * @throws {UnusableFile} for a file that cannot be taken; its parts stay until they are given up.
 */
export async function finishUpload(asked: Asked): Promise<FinishOutcome> {
  const row = await findUpload(asked.networkId, asked.id);
  if (!row) return { kind: 'unknown' };
  if (row.importId !== null) return already(row.networkId, row.importId);
  if (row.receivedBytes < row.fileBytes) {
    const message = `${row.receivedBytes} of ${row.fileBytes} bytes are here. Send the rest first.`;
    return { kind: 'incomplete', offset: row.receivedBytes, message };
  }
  try {
    const opened = await open(row, asked);
    await rm(partPath(row.fileKey), { force: true });
    return { kind: 'done', import: opened };
  } catch (error) {
    if (error instanceof FinishedMeanwhile) return finishUpload(asked);
    if ((error as { code?: string }).code !== 'ENOENT') throw error;
    return { kind: 'incomplete', offset: 0, message: 'What came is not here any more. Begin a new upload.' };
  }
}

async function open(row: ImportUploadRow, { userId, zone }: Asked): Promise<Import> {
  const { networkId, id, stationId, fileName, fileDigest: digest } = row;
  const station = await findStationById(stationId);
  if (!station) throw new Error('The station of the upload is not there.');
  const parts = createReadStream(partPath(row.fileKey), { end: row.fileBytes - 1 });
  return openImport(
    {
      networkId,
      station,
      userId,
      fileName,
      zone,
      digest,
      alsoDo: async (importId, transaction) => {
        const now = await lockUpload(networkId, id, transaction);
        if (now?.importId !== null) throw new FinishedMeanwhile();
        await updateUpload(id, { importId }, new Date(), transaction);
      },
    },
    parts,
  );
}

async function already(networkId: number, importId: number): Promise<FinishOutcome> {
  const made = await importOf(networkId, importId);
  return made ? { kind: 'done', import: made } : { kind: 'unknown' };
}
