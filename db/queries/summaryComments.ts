import { pool, type Connection } from './connection';
import type { RevisionKey } from './summaryDrafts';

export interface SummaryCommentRow {
  id: number;
  revision: number;
  body: string;
  createdBy: string;
  createdByName: string | null;
  createdAt: Date;
}

/** Standing comments on a month, oldest first. */
export async function listComments(
  networkId: number,
  month: string,
  conn: Connection = pool(),
): Promise<SummaryCommentRow[]> {
  return conn('summary_comments as c')
    .leftJoin('users as u', 'u.id', 'c.created_by')
    .where({ 'c.network_id': networkId, 'c.month': month, 'c.withdrawn_at': null })
    .orderBy('c.id')
    .select({
      id: 'c.id',
      revision: 'c.revision',
      body: 'c.body',
      createdBy: 'c.created_by',
      createdByName: 'u.name',
      createdAt: 'c.created_at',
    });
}

export async function insertComment(
  { networkId, month, revision }: RevisionKey,
  body: string,
  userId: string,
  conn: Connection,
): Promise<void> {
  await conn('summary_comments').insert({
    network_id: networkId,
    month,
    revision,
    body,
    created_by: userId,
    created_at: new Date(),
  });
}

/** Takes a person’s own comment back; answers whether there was one. */
export async function withdrawComment(
  networkId: number,
  id: number,
  userId: string,
  conn: Connection,
): Promise<boolean> {
  const changed: number = await conn('summary_comments')
    .where({ id, network_id: networkId, created_by: userId, withdrawn_at: null })
    .update({ withdrawn_at: new Date() });
  return changed > 0;
}
