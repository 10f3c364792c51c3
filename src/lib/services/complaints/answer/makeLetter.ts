import { readAnsweringSettings } from '#db/queries/answeringSettings';
import type { ComplaintRow } from '#db/queries/complaints';
import type { NetworkRow } from '#db/queries/networks';
import type { PersonalData } from '#lib/contracts/complaints';
import type { EvidencePack, PackItem } from '#lib/contracts/evidencePack';
import { localDateAt } from '#lib/time/zone';
import { factsOf } from '../letter/factsOf';
import { letterProblems, missingStatements, renderLetter } from '../letter/renderLetter';
import { letterPdf } from '../pdf/letterPdf';

/** What a letter is made from. */
export interface LetterSource {
  network: NetworkRow;
  complaint: ComplaintRow;
  person: PersonalData;
  /** Text with fields. */
  body: string;
  items: readonly PackItem[];
  pack: EvidencePack;
  signedBy: string;
}

/** A letter's text as it is sent; problems where it may not be. */
export type LetterText =
  { isReady: true; text: string } | { isReady: false; problems: string[]; text: string | null };

/** The letter's text with its fields filled in from the pack. */
export function letterText(source: LetterSource): LetterText {
  const problems = letterProblems(source.body);
  if (source.body.trim() === '') return { isReady: false, problems: ['must not be empty'], text: null };
  if (problems.length > 0) return { isReady: false, problems, text: null };
  const facts = factsOf(source);
  const missing = missingStatements(source.body, facts).map(
    (name) => `must say it with its figures: put {{${name}}} in`,
  );
  const text = renderLetter(source.body, facts);
  return missing.length > 0 ? { isReady: false, problems: missing, text } : { isReady: true, text };
}

/** The letter with its evidence as a PDF, dated `now`. The same function makes what is previewed and what is sent. */
export function pdfOf(source: LetterSource, text: string, now: Date): Promise<Buffer> {
  const { network, complaint, person, items, pack } = source;
  const { timeZone } = pack.evidence;
  return letterPdf({
    networkName: network.name,
    reference: complaint.reference,
    recipient: { name: person.contact.name, address: person.contact.address },
    date: localDateAt(Math.floor(now.getTime() / 1000), timeZone),
    text,
    items,
    pack,
  });
}

/** Where a resident's answer goes, with the reference filled in; null: to the sender. */
export async function replyAddressOf({ id }: NetworkRow, reference: string): Promise<string | null> {
  const { replyAddress } = await readAnsweringSettings(id);
  return replyAddress?.replaceAll('{reference}', reference) ?? null;
}
