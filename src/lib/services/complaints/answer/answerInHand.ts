import { findOpenAnswer } from '#db/queries/complaintAnswers';

/** Where the answer that is being written to a complaint stands, without what it says. */
export interface AnswerInHand {
  state: 'draft' | 'submitted';
  authorName: string;
  isOwn: boolean;
}

/** Null where none is being written. */
export async function answerInHand(complaintId: number, userId: string): Promise<AnswerInHand | null> {
  const answer = await findOpenAnswer(complaintId);
  return answer
    ? { state: answer.state, authorName: answer.authorName, isOwn: answer.author === userId }
    : null;
}
