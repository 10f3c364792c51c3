import { z } from 'zod';
import type { AnswerRow } from '#db/queries/complaintAnswers';
import { openValue, sealValue } from '../personalData';

const contentSchema = z.object({ body: z.string() });

/** Seals the text of an answer that is being written: it may name the resident. */
export function sealAnswer(wrappedKey: Buffer, complaintId: number, body: string): Buffer {
  return sealValue(wrappedKey, complaintId, 'answer', { body });
}

/** The text of an answer that is being written. @throws {PersonalDataUnreadable} */
export function openAnswer(
  wrappedKey: Buffer,
  { complaintId, ciphertext }: Pick<AnswerRow, 'complaintId' | 'ciphertext'>,
): string {
  return contentSchema.parse(openValue(wrappedKey, complaintId, 'answer', ciphertext)).body;
}
