import { listReceived } from '#db/queries/complaintReceived';
import type { Connection } from '#db/queries/connection';
import { openValue } from '../personalData';
import { receivedContentSchema, type ReceivedContent } from './readMessage';

/** An answer that a resident gave, filed under the reference. */
export interface FiledAnswer extends ReceivedContent {
  id: number;
  source: 'message' | 'note';
  receivedAt: Date;
  filedBy: string | null;
}

/** Answers received, oldest first; none once erased. The caller audits the look. @throws {PersonalDataUnreadable} */
export async function listFiled(complaintId: number, conn: Connection): Promise<FiledAnswer[]> {
  const rows = await listReceived(complaintId, conn);
  return rows.map(({ id, source, receivedAt, filedByName, wrappedKey, ciphertext }) => ({
    ...receivedContentSchema.parse(openValue(wrappedKey, complaintId, 'received', ciphertext)),
    id,
    source,
    receivedAt,
    filedBy: filedByName,
  }));
}
