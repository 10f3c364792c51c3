import { z } from 'zod';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { insertNote, listSealedNotes, setNoteWithdrawn } from '#db/queries/complaintNotes';
import type { Connection } from '#db/queries/connection';
import { openValue, sealValue } from '../personalData';
import { actOnComplaint, type DeskAct, type DeskOutcome } from './deskAct';

/** An internal note: for those who answer, never for the resident or the regulator. */
export interface DeskNote {
  id: number;
  text: string;
  author: string;
  at: Date;
}

/** Keeps an internal note, sealed under the complaint's key since it may name somebody. */
export function addNote(act: DeskAct, text: string): Promise<DeskOutcome> {
  return actOnComplaint(act, async ({ id }, transaction) => {
    const sealed = await findSealedPerson(id, transaction);
    if (!sealed) return 'The personal data have been erased: no note can be kept any more.';
    const ciphertext = sealValue(sealed.wrappedKey, id, 'note', text);
    const noteId = await insertNote({ complaintId: id, ciphertext, author: act.userId }, transaction);
    return { action: 'complaint.note-add', detail: { noteId } };
  });
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
