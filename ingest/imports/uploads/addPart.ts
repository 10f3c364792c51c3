import { constants } from 'node:fs';
import { mkdir, open } from 'node:fs/promises';
import { dirname } from 'node:path';
import { inTransaction } from '#db/queries/connection';
import { lockUpload, updateUpload } from '#db/queries/importUploads';
import { type Upload } from '#lib/contracts/importUploads';
import { partPath } from '../files';
import { uploadJson } from './uploadJson';

/** Which bytes of a file a part is. */
export interface PartRange {
  first: number;
  /** Bytes of the whole file, as the sender says with each part. */
  wholeBytes: number;
}

export type PartOutcome =
  | { kind: 'kept'; upload: Upload }
  | { kind: 'unknown' }
  /** The part does not go on where the file ends here, or the file is another; `offset` is where it goes on. */
  | { kind: 'wrong-place'; offset: number; message: string };

/** Adds the next part of a file; it is durable when the promise resolves. The same part sent twice at once is kept once. */
export function addPart(
  { networkId, id }: { networkId: number; id: number },
  { first, wholeBytes }: PartRange,
  bytes: Uint8Array,
): Promise<PartOutcome> {
  return inTransaction<PartOutcome>(async (transaction) => {
    const row = await lockUpload(networkId, id, transaction);
    if (!row) return { kind: 'unknown' };
    const misplaced = (message: string, offset = row.receivedBytes): PartOutcome => ({
      kind: 'wrong-place',
      offset,
      message,
    });
    if (row.importId !== null) return misplaced('The upload is finished.');
    if (wholeBytes !== row.fileBytes || first + bytes.length > row.fileBytes) {
      return misplaced(`The file was announced with ${row.fileBytes} bytes.`);
    }
    if (first !== row.receivedBytes) return misplaced(`The file goes on at byte ${row.receivedBytes}.`);
    const heldBytes = await writeAt(partPath(row.fileKey), first, bytes);
    await updateUpload(id, { receivedBytes: heldBytes }, new Date(), transaction);
    if (heldBytes !== first + bytes.length) {
      return misplaced(
        `What came before is not here any more. The file goes on at byte ${heldBytes}.`,
        heldBytes,
      );
    }
    return { kind: 'kept', upload: uploadJson({ ...row, receivedBytes: heldBytes }) };
  });
}

/** Writes bytes into a file unless it is shorter than where they belong. @returns how long the file then is, from its beginning. */
async function writeAt(path: string, first: number, bytes: Uint8Array): Promise<number> {
  await mkdir(dirname(path), { recursive: true });
  const file = await open(path, constants.O_RDWR | constants.O_CREAT, 0o600);
  try {
    const { size } = await file.stat();
    if (size < first) return size;
    for (let at = 0; at < bytes.length;) {
      at += (await file.write(bytes, at, bytes.length - at, first + at)).bytesWritten;
    }
    await file.datasync();
    return first + bytes.length;
  } finally {
    await file.close();
  }
}
