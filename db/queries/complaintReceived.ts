import { pool, type Connection } from './connection';

/** An answer that a resident sent, sealed. */
export interface ReceivedRow {
  id: number;
  source: 'message' | 'note';
  ciphertext: Buffer;
  wrappedKey: Buffer;
  receivedAt: Date;
  filedByName: string | null;
}

/** Answers received to a complaint that were not withdrawn, oldest first; none once its personal data have been erased. */
export async function listReceived(complaintId: number, conn: Connection = pool()): Promise<ReceivedRow[]> {
  return conn('complaint_received as r')
    .join('complaint_keys as k', 'k.complaint_id', 'r.complaint_id')
    .leftJoin('users as u', 'u.id', 'r.filed_by')
    .where({ 'r.complaint_id': complaintId })
    .whereNull('r.withdrawn_at')
    .orderBy(['r.received_at', 'r.id'])
    .select({
      id: 'r.id',
      source: 'r.source',
      ciphertext: 'r.ciphertext',
      wrappedKey: 'k.wrapped_key',
      receivedAt: 'r.received_at',
      filedByName: 'u.name',
    });
}

export interface NewReceived {
  complaintId: number;
  source: 'message' | 'note';
  ciphertext: Buffer;
  /** SHA-256 of its Message-ID; null where it has none. */
  messageDigest: Buffer | null;
  receivedAt: Date;
  filedBy: string;
}

/** Files an answer; null when the same message was filed before. */
export async function insertReceived(received: NewReceived, conn: Connection): Promise<number | null> {
  try {
    const [id] = await conn('complaint_received').insert({
      complaint_id: received.complaintId,
      source: received.source,
      ciphertext: received.ciphertext,
      message_digest: received.messageDigest,
      received_at: received.receivedAt,
      filed_by: received.filedBy,
      created_at: new Date(),
    });
    return Number(id);
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    return null;
  }
}

/** Withdraws an answer that was filed by mistake: its content is destroyed, and it may be filed again. */
export async function withdrawReceived(
  complaintId: number,
  id: number,
  userId: string,
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('complaint_received')
    .where({ complaint_id: complaintId, id })
    .whereNull('withdrawn_at')
    .update({
      withdrawn_by: userId,
      withdrawn_at: new Date(),
      ciphertext: Buffer.alloc(0),
      message_digest: null,
    });
  return changed === 1;
}
