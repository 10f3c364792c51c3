import { z } from 'zod';
import { findSealedLetter } from '#db/queries/complaintLetters';
import { findSealedReply, listReplies } from '#db/queries/complaintReplies';
import { evidencePackSchema } from '#lib/contracts/evidencePack';
import { letterHtml } from './letter/letterHtml';
import { openFile, openValue } from './personalData';

/** What rests sealed of a reply. `to` is null for a letter that is printed and posted. */
const replyContentSchema = z.object({
  to: z.string().nullable(),
  subject: z.string(),
  text: z.string(),
  /** Where an answer goes; null: to the sender. */
  replyTo: z.string().nullable().default(null),
  /** The evidence as it was sent; left out of replies from before it was kept. */
  pack: evidencePackSchema.optional(),
});
export type ReplyContent = z.output<typeof replyContentSchema>;

/** An e-mail ready to be handed over. */
export interface ReplyMessage {
  to: string;
  subject: string;
  text: string;
  html: string;
  replyTo?: { name: string; address: string };
  /** Message-IDs of what was written to the resident before, so that mail programs keep them together. */
  references?: string[];
  attachments: { filename: string; content: Buffer; contentType: string }[];
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
  const { to, subject, text, replyTo } = openReply(sealed);
  if (to === null) return null;
  const pdf = await openLetter(replyId, sealed.complaintId);
  const earlier = (await listReplies(sealed.complaintId)).filter(({ id }) => id < replyId);
  const references = earlier.flatMap(({ messageId }) => messageId ?? []);
  return {
    to,
    subject,
    text,
    html: letterHtml(text),
    ...(replyTo === null ? {} : { replyTo: { name: '', address: replyTo } }),
    ...(references.length === 0 ? {} : { references }),
    attachments:
      pdf === null
        ? []
        : [{ filename: letterFileName(subject), content: pdf, contentType: 'application/pdf' }],
  };
}

/**
 * The PDF of a complaint's reply as it was sent; null where there is none, or its personal data have been erased.
 * @throws {PersonalDataUnreadable}
 */
export async function openLetter(replyId: number, complaintId: number): Promise<Buffer | null> {
  const letter = await findSealedLetter(replyId);
  return letter?.complaintId === complaintId
    ? openFile(letter.wrappedKey, letter.complaintId, letter.ciphertext, 'letter')
    : null;
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

/** Name of the attached file: the reference of the subject and nothing personal. */
function letterFileName(subject: string): string {
  return `${subject.split(' ').at(-1) ?? 'answer'}.pdf`;
}
