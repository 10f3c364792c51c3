import { simpleParser } from 'mailparser';
import { z } from 'zod';

const MOST_CHARACTERS = 20_000;
/** `MER-2026-0042` wherever it stands: in a subject, an address, a Message-ID. */
const REFERENCE = /[A-Z0-9]{1,3}-\d{4}-\d{4,}/gi;

/** What is kept of an answer received, sealed. */
export const receivedContentSchema = z.object({
  from: z.string().nullable(),
  subject: z.string().nullable(),
  text: z.string(),
  /** How many files came with it; they are not kept. */
  attachments: z.number().int(),
});
export type ReceivedContent = z.output<typeof receivedContentSchema>;

/** An e-mail as it came. */
export interface ReadMessage {
  content: ReceivedContent;
  at: Date;
  messageId: string | null;
  /** References that its subject, its recipients or what it answers name, without repetition. */
  named: string[];
}

/** Reads the bytes of an .eml file; null where they are not a message. Nothing in it is fetched or run. */
export async function readMessage(bytes: Buffer): Promise<ReadMessage | null> {
  const mail = await simpleParser(bytes, { skipImageLinks: true, skipTextToHtml: true });
  const from = mail.from?.text ?? null;
  const text = (mail.text ?? '').trim();
  if (from === null || (text === '' && mail.subject === undefined)) return null;
  const recipients = [mail.to ?? []].flat().map((to) => to.text);
  const answered = [mail.inReplyTo ?? '', ...[mail.references ?? []].flat()];
  const places = [mail.subject ?? '', ...recipients, ...answered].join(' ');
  return {
    content: {
      from,
      subject: mail.subject ?? null,
      text: text.slice(0, MOST_CHARACTERS),
      attachments: mail.attachments.length,
    },
    at: mail.date ?? new Date(),
    messageId: mail.messageId ?? null,
    named: [...new Set([...places.matchAll(REFERENCE)].map(([found]) => found.toUpperCase()))],
  };
}
