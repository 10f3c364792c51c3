import { pool, type Connection } from './connection';

/** Sealed personal data of a complaint; only `#lib/services/complaints/personalData` opens it. */
export interface SealedPerson {
  wrappedKey: Buffer;
  ciphertext: Buffer;
}

export async function insertComplaintKey(
  complaintId: number,
  wrappedKey: Buffer,
  conn: Connection,
): Promise<void> {
  await conn('complaint_keys').insert({
    complaint_id: complaintId,
    wrapped_key: wrappedKey,
    created_at: new Date(),
  });
}

/** Writes the sealed personal data, in place of what stood there. */
export async function writeComplaintPrivate(
  complaintId: number,
  ciphertext: Buffer,
  conn: Connection,
): Promise<void> {
  await conn('complaint_private')
    .insert({ complaint_id: complaintId, ciphertext, updated_at: new Date() })
    .onConflict('complaint_id')
    .merge();
}

/** Undefined once the personal data have been erased. */
export async function findSealedPerson(
  complaintId: number,
  conn: Connection = pool(),
): Promise<SealedPerson | undefined> {
  return conn('complaint_private as p')
    .join('complaint_keys as k', 'k.complaint_id', 'p.complaint_id')
    .where({ 'p.complaint_id': complaintId })
    .first({ wrappedKey: 'k.wrapped_key', ciphertext: 'p.ciphertext' });
}

/**
 * Destroys the key and every ciphertext of a complaint's personal data: of its replies, their letters and an answer being written,
 * of what the resident answered or added and of the attached file too. Not to be undone.
 */
export async function destroyPersonalData(complaintId: number, conn: Connection): Promise<void> {
  await conn('complaint_keys').where({ complaint_id: complaintId }).delete();
  await conn('complaint_private').where({ complaint_id: complaintId }).delete();
  await conn('complaint_additions').where({ complaint_id: complaintId }).delete();
  await conn('complaint_attachments').where({ complaint_id: complaintId }).delete();
  await conn('complaint_letters').where({ complaint_id: complaintId }).delete();
  await conn('complaint_answers')
    .where({ open_complaint_id: complaintId })
    .update({ state: 'withdrawn', updated_at: new Date() });
  for (const table of ['complaint_replies', 'complaint_answers', 'complaint_received']) {
    await conn(table)
      .where({ complaint_id: complaintId })
      .update({ ciphertext: Buffer.alloc(0) });
  }
}
