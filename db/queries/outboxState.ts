import { pool, type Connection } from './connection';

export type MailState = 'waiting' | 'sent' | 'dead';

/** A message of a network as it stands in the outbox, without what it says. */
export interface MailRow {
  id: number;
  kind: string;
  /** Null: a resident, whose address stands nowhere here. */
  recipient: string | null;
  subject: string;
  state: MailState;
  attempts: number;
  nextAttemptAt: Date;
  lastError: string | null;
  createdAt: Date;
  sentAt: Date | null;
}

/** How many messages of a network wait, were sent since an instant, and could not be delivered. */
export async function countMails(
  networkId: number,
  sentSince: Date,
  conn: Connection = pool(),
): Promise<Record<MailState, number>> {
  const rows: { state: MailState; count: number }[] = await conn('outbox')
    .where({ network_id: networkId })
    .where((query) => query.whereNot({ state: 'sent' }).orWhere('sent_at', '>=', sentSince))
    .groupBy('state')
    .select('state', conn.raw('COUNT(*) AS count'));
  const countOf = (state: MailState) => Number(rows.find((row) => row.state === state)?.count ?? 0);
  return { waiting: countOf('waiting'), sent: countOf('sent'), dead: countOf('dead') };
}

/** Messages of a network in a state, latest first, from the one before `beforeId` on. */
export async function listMails(
  networkId: number,
  state: MailState,
  { limit, beforeId }: { limit: number; beforeId: number | null },
  conn: Connection = pool(),
): Promise<MailRow[]> {
  const rows = conn('outbox')
    .where({ network_id: networkId, state })
    .orderBy('id', 'desc')
    .limit(limit)
    .select({
      id: 'id',
      kind: 'kind',
      recipient: 'recipient',
      subject: 'subject',
      state: 'state',
      attempts: 'attempts',
      nextAttemptAt: 'next_attempt_at',
      lastError: 'last_error',
      createdAt: 'created_at',
      sentAt: 'sent_at',
    });
  if (beforeId !== null) void rows.where('id', '<', beforeId);
  return rows;
}

/**
 * Has messages of a network that were not sent tried anew at once, under their Message-ID; a lease that is held stays, so that
 * one on its way is not taken twice. `id` null: every one that was given up. @returns how many.
 */
export async function retryMails(
  networkId: number,
  id: number | null,
  now: Date,
  transaction: Connection,
): Promise<number> {
  return transaction('outbox')
    .where({ network_id: networkId })
    .where(id === null ? { state: 'dead' } : { id })
    .whereIn('state', ['waiting', 'dead'])
    .update({ state: 'waiting', attempts: 0, next_attempt_at: now });
}
