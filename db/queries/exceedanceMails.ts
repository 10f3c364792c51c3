import { pool, type Connection } from './connection';

/** Notes which exceedances a message tells of. */
export async function insertExceedanceMails(
  mailId: number,
  exceedanceIds: readonly number[],
  transaction: Connection,
): Promise<void> {
  await transaction('exceedance_mails').insert(
    [...new Set(exceedanceIds)].map((exceedanceId) => ({ exceedance_id: exceedanceId, outbox_id: mailId })),
  );
}

/** A message that told of an exceedance, and how it fared. */
export interface ExceedanceMailRow {
  recipient: string;
  state: 'waiting' | 'sent' | 'dead';
  attempts: number;
  createdAt: Date;
  sentAt: Date | null;
  lastError: string | null;
}

/** Messages that tell of an exceedance, oldest first. */
export async function listExceedanceMails(
  exceedanceId: number,
  conn: Connection = pool(),
): Promise<ExceedanceMailRow[]> {
  return conn('exceedance_mails as m')
    .join('outbox as o', 'o.id', 'm.outbox_id')
    .where('m.exceedance_id', exceedanceId)
    .orderBy(['o.created_at', 'o.id'])
    .select({
      recipient: 'o.recipient',
      state: 'o.state',
      attempts: 'o.attempts',
      createdAt: 'o.created_at',
      sentAt: 'o.sent_at',
      lastError: 'o.last_error',
    });
}
