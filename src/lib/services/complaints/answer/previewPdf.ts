import type { NetworkRow } from '#db/queries/networks';
import { unsentReason } from '../answerCase';
import { openAnswerDesk } from './answerDesk';
import { pdfOf } from './makeLetter';

export type PreviewOutcome = { kind: 'pdf'; pdf: Buffer } | { kind: 'refused'; message: string };

/** The PDF of the kept answer as it would be sent now; undefined where none is being written. The look is audited. */
export async function previewPdf(
  userId: string,
  network: NetworkRow,
  reference: string,
  now: Date,
): Promise<PreviewOutcome | undefined> {
  const desk = await openAnswerDesk(userId, network, reference, now);
  if (!desk?.kept) return undefined;
  const { letter } = desk;
  if (!letter.isReady) {
    return { kind: 'refused', message: unsentReason({ kind: 'text-refused', problems: letter.problems }) };
  }
  return { kind: 'pdf', pdf: await pdfOf({ ...desk, network }, letter.text, now) };
}
