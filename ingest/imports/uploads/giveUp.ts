import { rm } from 'node:fs/promises';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { deleteUpload, lockUpload } from '#db/queries/importUploads';
import { partPath } from '../files';

/** Removes an upload that is not finished, and what came of it. @returns false when the network has none of this number. */
export async function giveUpUpload({
  networkId,
  id,
  userId,
}: {
  networkId: number;
  id: number;
  userId: string;
}): Promise<boolean> {
  const fileKey = await inTransaction(async (transaction) => {
    const row = await lockUpload(networkId, id, transaction);
    if (!row || row.importId !== null) return null;
    await deleteUpload(id, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'import.give-up',
        subject: `station ${row.stationCode}`,
        detail: { file: row.fileName, bytes: row.fileBytes, received: row.receivedBytes },
      },
      transaction,
    );
    return row.fileKey;
  });
  if (fileKey === null) return false;
  await rm(partPath(fileKey), { force: true });
  return true;
}
