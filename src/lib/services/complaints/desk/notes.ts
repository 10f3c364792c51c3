import { z } from 'zod';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { appendAudit } from '#db/queries/audit';
import { insertNote, listSealedNotes, setNoteWithdrawn } from '#db/queries/complaintNotes';
import type { ComplaintRow } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import { openValue, sealValue } from '../personalData';
import { actOnComplaint, type DeskAct, type DeskOutcome } from './deskAct';

/** An internal note: for those who answer, never for the resident or the regulator. */
export interface DeskNote {
  id: number;
  text: string;
  author: string;
  at: Date;
}

type NoteOutcome = Exclude<DeskOutcome, { kind: 'done' }> | { kind: 'done'; noteId: number };

/** Keeps an internal note, sealed under the complaint's key since it may name somebody. */
export async function addNote(act: DeskAct, text: string): Promise<NoteOutcome> {
  let kept = 0;
  const outcome = await actOnComplaint(act, async ({ id }, transaction) => {
    const sealed = await findSealedPerson(id, transaction);
    if (!sealed) return 'The personal data have been erased: no note can be kept any more.';
    const ciphertext = sealValue(sealed.wrappedKey, id, 'note', text);
    const noteId = await insertNote({ complaintId: id, ciphertext, author: act.userId }, transaction);
    kept = noteId;
    return { action: 'complaint.note-add', detail: { noteId } };
  });
  return outcome.kind === 'done' ? { kind: 'done', noteId: kept } : outcome;
}

/** Withdraws a note, or puts a withdrawn one back. */
export function withdrawNote(act: DeskAct, noteId: number, isBack: boolean): Promise<DeskOutcome> {
  return actOnComplaint(act, async ({ id }, transaction) => {
    const by = isBack ? null : act.userId;
    if (!(await setNoteWithdrawn({ complaintId: id, noteId, by }, transaction))) {
      return 'Somebody did that before. Nothing was changed.';
    }
    return { action: isBack ? 'complaint.note-restore' : 'complaint.note-withdraw', detail: { noteId } };
  });
}

/** Notes that stand, oldest first; none once erased. The caller audits the look. @throws {PersonalDataUnreadable} */
export async function openNotes(complaintId: number, conn: Connection): Promise<DeskNote[]> {
  const sealed = await listSealedNotes(complaintId, conn);
  return sealed.map(({ id, wrappedKey, ciphertext, authorName, createdAt }) => ({
    id,
    text: z.string().parse(openValue(wrappedKey, complaintId, 'note', ciphertext)),
    author: authorName,
    at: createdAt,
  }));
}

/** The same for a person who answers; a look at notes is audited. @throws {PersonalDataUnreadable} */
export function readNotes(
  userId: string,
  { id, networkId, reference }: Pick<ComplaintRow, 'id' | 'networkId' | 'reference'>,
): Promise<DeskNote[]> {
  return inTransaction(async (transaction) => {
    const notes = await openNotes(id, transaction);
    if (notes.length > 0) {
      const subject = `complaint ${reference}`;
      const look = { action: 'complaint.personal-data-read', subject, detail: { fields: ['notes'] } };
      await appendAudit({ userId, networkId, ...look }, transaction);
    }
    return notes;
  });
}
