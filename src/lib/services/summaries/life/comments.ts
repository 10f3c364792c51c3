import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findLatestDraft } from '#db/queries/summaryDrafts';
import { insertComment, listComments, withdrawComment } from '#db/queries/summaryComments';
import { type SummaryComment } from '#lib/contracts/summaryLife';
import { done, unknown, type Outcome } from '../../outcome';
import { type MonthActor } from './acts';

/** A comment as its page shows it. */
export interface ShownComment extends SummaryComment {
  /** Whether this person wrote it, and so may take it back. */
  isOwn: boolean;
}

/** Comments on a month, oldest first. */
export async function monthComments(
  networkId: number,
  month: string,
  userId: string,
): Promise<ShownComment[]> {
  const rows = await listComments(networkId, month);
  return rows.map((row) => ({
    id: row.id,
    revision: row.revision,
    body: row.body,
    by: row.createdByName ?? row.createdBy,
    at: row.createdAt.toISOString(),
    isOwn: row.createdBy === userId,
  }));
}

/** Adds a comment to the revision that is being made, or to the latest. The audit entry does not hold its words. */
export function commentOnMonth({ network, month, userId }: MonthActor, body: string): Promise<Outcome<null>> {
  return inTransaction<Outcome<null>>(async (transaction) => {
    const draft = await findLatestDraft(network.id, month, transaction);
    if (!draft) return unknown('The month has not been drafted yet.');
    await insertComment(draft, body, userId, transaction);
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'summary.comment',
        subject: `summary ${month} revision ${draft.revision}`,
        detail: {},
      },
      transaction,
    );
    return done(null);
  });
}

/** Takes one's own comment back. */
export function takeCommentBack({ network, month, userId }: MonthActor, id: number): Promise<Outcome<null>> {
  return inTransaction<Outcome<null>>(async (transaction) => {
    if (!(await withdrawComment(network.id, id, userId, transaction))) {
      return unknown('There is no such comment of yours.');
    }
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'summary.withdraw-comment',
        subject: `summary ${month}`,
        detail: { comment: id },
      },
      transaction,
    );
    return done(null);
  });
}
