import { z } from 'zod';
import type { AnswerRow } from '#db/queries/complaintAnswers';
import { elsewhereSchema } from '#lib/contracts/evidencePack';
import { openValue, sealValue } from '../personalData';

const contentSchema = z.object({
  body: z.string(),
  /** When the same spectrum was heard otherwise, as it was found; null: not looked for. */
  elsewhere: elsewhereSchema.nullable().default(null),
});
export type KeptContent = z.output<typeof contentSchema>;

/** Seals what an answer that is being written says: it may name the resident. */
export function sealAnswer(wrappedKey: Buffer, complaintId: number, content: KeptContent): Buffer {
  return sealValue(wrappedKey, complaintId, 'answer', content);
}

/** What an answer that is being written says. @throws {PersonalDataUnreadable} */
export function openAnswer(
  wrappedKey: Buffer,
  { complaintId, ciphertext }: Pick<AnswerRow, 'complaintId' | 'ciphertext'>,
): KeptContent {
  return contentSchema.parse(openValue(wrappedKey, complaintId, 'answer', ciphertext));
}
