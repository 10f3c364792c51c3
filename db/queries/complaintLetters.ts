import { pool, type Connection } from './connection';

/** A letter's PDF as it was sent, sealed. */
export interface SealedLetter {
  complaintId: number;
  wrappedKey: Buffer;
  ciphertext: Buffer;
  /** SHA-256 of the PDF itself. */
  sha256: Buffer;
}

export async function insertLetter(
  letter: { replyId: number; complaintId: number; ciphertext: Buffer; byteCount: number; sha256: Buffer },
  conn: Connection,
): Promise<void> {
  await conn('complaint_letters').insert({
    reply_id: letter.replyId,
    complaint_id: letter.complaintId,
    ciphertext: letter.ciphertext,
    byte_count: letter.byteCount,
    sha256: letter.sha256,
    created_at: new Date(),
  });
}

/** Undefined for a reply without a PDF, or whose personal data have been erased. */
export async function findSealedLetter(
  replyId: number,
  conn: Connection = pool(),
): Promise<SealedLetter | undefined> {
  return conn('complaint_letters as l')
    .join('complaint_keys as k', 'k.complaint_id', 'l.complaint_id')
    .where({ 'l.reply_id': replyId })
    .first({
      complaintId: 'l.complaint_id',
      wrappedKey: 'k.wrapped_key',
      ciphertext: 'l.ciphertext',
      sha256: 'l.sha256',
    });
}
