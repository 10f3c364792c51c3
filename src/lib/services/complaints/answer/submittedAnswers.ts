import { listSubmitted } from '#db/queries/complaintAnswers';
import type { WaitingAnswer } from '#lib/contracts/complaintList';

/** Answers of a network that wait for a second person, by the reference of their complaint; for those who may answer. */
export async function submittedAnswers(
  networkId: number,
  userId: string,
): Promise<ReadonlyMap<string, WaitingAnswer>> {
  const submitted = await listSubmitted(networkId);
  return new Map(
    submitted.map(({ reference, author, authorName }) => [
      reference,
      { authorName, isOwn: author === userId },
    ]),
  );
}
