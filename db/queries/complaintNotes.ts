import { pool, type Connection } from './connection';

/** A sealed internal note; only `#lib/services/complaints/desk/notes` opens it. */
export interface SealedNote {
  id: number;
  ciphertext: Buffer;
  wrappedKey: Buffer;
  author: string;
  authorName: string;
  createdAt: Date;
}

export async function insertNote(
  note: { complaintId: number; ciphertext: Buffer; author: string },
  conn: Connection,
): Promise<number> {
  const [id] = await conn('complaint_notes').insert({
    complaint_id: note.complaintId,
    ciphertext: note.ciphertext,
    author: note.author,
    created_at: new Date(),
  });
  return Number(id);
}

/** Notes that stand, oldest first; none once the personal data have been erased. */
export async function listSealedNotes(complaintId: number, conn: Connection = pool()): Promise<SealedNote[]> {
  return conn('complaint_notes as n')
    .join('complaint_keys as k', 'k.complaint_id', 'n.complaint_id')
    .join('users as u', 'u.id', 'n.author')
    .where({ 'n.complaint_id': complaintId })
    .whereNull('n.withdrawn_at')
    .orderBy('n.id')
    .select({
      id: 'n.id',
      ciphertext: 'n.ciphertext',
      wrappedKey: 'k.wrapped_key',
      author: 'n.author',
      authorName: 'u.name',
      createdAt: 'n.created_at',
    });
}

/** Withdraws a note, or puts a withdrawn one back; false where there was nothing to change. */
export async function setNoteWithdrawn(
  { complaintId, noteId, by }: { complaintId: number; noteId: number; by: string | null },
  conn: Connection,
): Promise<boolean> {
  const query = conn('complaint_notes').where({ id: noteId, complaint_id: complaintId });
  const changed = by
    ? await query.whereNull('withdrawn_at').update({ withdrawn_by: by, withdrawn_at: new Date() })
    : await query.whereNotNull('withdrawn_at').update({ withdrawn_by: null, withdrawn_at: null });
  return changed === 1;
}

/** Numbers of notes that were withdrawn and can be put back. */
export async function listWithdrawnNotes(complaintId: number, conn: Connection = pool()): Promise<number[]> {
  return conn('complaint_notes as n')
    .join('complaint_keys as k', 'k.complaint_id', 'n.complaint_id')
    .where({ 'n.complaint_id': complaintId })
    .whereNotNull('n.withdrawn_at')
    .orderBy('n.id')
    .pluck('n.id');
}
