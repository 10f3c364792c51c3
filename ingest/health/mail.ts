import { insertMail } from '#db/queries/outbox';
import { messageIdOf } from '#lib/services/mails/messageId';
import { noteHtml, noteText, type Note } from '#lib/services/mails/note';
import type { Connection } from '#db/queries/connection';

export type { Note };

export interface NoteCause {
  networkId: number;
  kind: string;
  /** Names the cause: one message a cause and recipient, for good. */
  key: string;
}

/** Puts a note into the outbox for each recipient, in the transaction of its cause. @returns how many were new. */
export async function putNotes(
  note: Note,
  { networkId, kind, key }: NoteCause,
  recipients: readonly string[],
  transaction: Connection,
): Promise<number> {
  let added = 0;
  for (const recipient of new Set(recipients)) {
    const messageId = messageIdOf(`${kind}:${networkId}:${key}:${recipient}`);
    const mail = { messageId, dedupeKey: `${kind}:${messageId}`, networkId, kind, recipient };
    const subject = note.subject.replace(/\s+/g, ' ').trim();
    const id = await insertMail(
      { ...mail, subject, text: noteText(note), html: noteHtml(note) },
      transaction,
    );
    if (id !== null) added += 1;
  }
  return added;
}
