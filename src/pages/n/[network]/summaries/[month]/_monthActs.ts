import { monthActSchema, newCommentSchema, proposalDecisionSchema } from '#lib/contracts/summaryLife';
import { type FormValues } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { badRequest } from '#lib/http/problem';
import { actOnMonth, decideOnProposal, type MonthActor } from '#lib/services/summaries/life/acts';
import { commentOnMonth, takeCommentBack } from '#lib/services/summaries/life/comments';

export const MONTH_DONE = {
  draft: 'Its figures are being made.',
  submit: 'It is in review.',
  return: 'It is a draft again.',
  discard: 'The revision is given up. What was issued stands.',
  issue: 'It is being issued: files and seal are made now.',
  comment: 'The comment is noted.',
  withdraw: 'The comment is taken back.',
  accept: 'The next revision is drafted.',
  dismiss: 'The proposal is dismissed. What was issued stands.',
} as const;

export type MonthDone = keyof typeof MONTH_DONE;

export const MONTH_LABELS = {
  confirm: 'Confirmation',
  documentSha256: 'What was reviewed',
  note: 'Note',
  body: 'Comment',
  reason: 'Reason',
};

/** Does what a form of the review page asks. @throws {Problem} 4xx, and zod errors, with what is wrong by field. */
export async function actOnReview({ text }: FormValues, actor: MonthActor): Promise<MonthDone> {
  const act = text['act'] ?? '';
  switch (act) {
    case 'draft':
    case 'submit':
    case 'return':
    case 'discard':
    case 'issue': {
      const asked = monthActSchema.parse({
        act,
        documentSha256: text['documentSha256'] ?? '',
        confirm: text['confirm'] === 'yes',
        note: text['note'] ?? '',
      });
      valueOf(await actOnMonth(actor, asked));
      return act;
    }
    case 'comment':
      valueOf(await commentOnMonth(actor, newCommentSchema.parse({ body: text['body'] ?? '' }).body));
      return act;
    case 'withdraw':
      valueOf(await takeCommentBack(actor, idOf(text['comment'])));
      return act;
    case 'accept':
    case 'dismiss': {
      const decision = proposalDecisionSchema.parse({ decision: act, reason: text['reason'] ?? '' });
      valueOf(await decideOnProposal(actor, idOf(text['proposal']), decision));
      return act;
    }
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}
