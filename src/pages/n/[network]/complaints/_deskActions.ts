import { typedFields } from '#components/complaints/complaintForm.ts';
import { noteSchema } from '#lib/contracts/complaintDesk';
import { assignCase } from '#lib/services/complaints/desk/assign';
import type { DeskAct, DeskOutcome } from '#lib/services/complaints/desk/deskAct';
import { mergeCase, unmergeCase } from '#lib/services/complaints/desk/merge';
import { addNote, withdrawNote } from '#lib/services/complaints/desk/notes';

/** What a form of the desk on the case page came to; a note that was not kept comes back as typed. */
export type DeskActOutcome = DeskOutcome & { note?: string };

/** Does what a form of the desk asks; null: it is a form of another part of the page. The caller has checked the role. */
export async function actOnDesk(form: FormData, act: DeskAct): Promise<DeskActOutcome | null> {
  const { assignee, into, note, noteId } = typedFields(form, ['assignee', 'into', 'note', 'noteId']);
  switch (form.get('action')) {
    case 'assign':
      return assignCase(act, assignee === '' ? null : assignee);
    case 'take':
      return assignCase(act, act.userId);
    case 'merge':
      return mergeCase(act, into);
    case 'unmerge':
      return unmergeCase(act);
    case 'note':
      return keepNote(act, note);
    case 'note-withdraw':
      return withdrawNote(act, Number(noteId), false);
    case 'note-restore':
      return withdrawNote(act, Number(noteId), true);
    default:
      return null;
  }
}

async function keepNote(act: DeskAct, typed: string): Promise<DeskActOutcome> {
  const note = noteSchema.safeParse(typed);
  if (!note.success) {
    return {
      kind: 'refused',
      message: `The note ${note.error.issues[0]?.message ?? 'cannot be kept'}.`,
      note: typed,
    };
  }
  return { ...(await addNote(act, note.data)), note: typed };
}
