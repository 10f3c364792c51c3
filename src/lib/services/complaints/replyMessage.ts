import { z } from 'zod';
import { findSealedReply } from '#db/queries/complaintReplies';
import { letterHtml } from './letter/letterHtml';
import { openValue } from './personalData';

/** What rests sealed of a reply. `to` is null for a letter that is printed and posted. */
export const replyContentSchema = z.object({
  to: z.string().nullable(),
  subject: z.string(),
  text: z.string(),
});
export type ReplyContent = z.output<typeof replyContentSchema>;

/** An e-mail ready to be handed over. */
export interface ReplyMessage {
  to: string;
  subject: string;
  text: string;
  html: string;
}

/**
 * Whom a complaint's reply goes to and what it says, opened at the moment of sending only. Null when the personal data have
 * been erased or the reply is a letter on paper: then nothing is to be sent. No person looks here, so the audit row is that of
 * the reply itself.
 * @throws {PersonalDataUnreadable} when the settings hold another personal-data key.
 */
export async function resolveComplaintReply(replyId: number): Promise<ReplyMessage | null> {
  const sealed = await findSealedReply(replyId);
  if (!sealed) return null;
  const { to, subject, text } = openReply(sealed);
  return to === null ? null : { to, subject, text, html: letterHtml(text) };
}

/** The content of a sealed reply. @throws {PersonalDataUnreadable} */
export function openReply(sealed: {
  complaintId: number;
  wrappedKey: Buffer;
  ciphertext: Buffer;
}): ReplyContent {
  return replyContentSchema.parse(
    openValue(sealed.wrappedKey, sealed.complaintId, 'reply', sealed.ciphertext),
  );
}
