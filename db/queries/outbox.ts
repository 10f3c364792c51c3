import { type Connection, inTransaction } from './connection';

/** A message to be put into the outbox, in the transaction of its cause. */
export interface NewMail {
  messageId: string;
  /** One message a cause and recipient: a second one with the same key is not added. */
  dedupeKey: string;
  /** Null: of no network, such as what concerns a person's account. */
  networkId: number | null;
  kind: string;
  recipient: string;
  subject: string;
  /** Null, as `html`: resolved by kind at sending, so that no secret stands here. */
  text: string | null;
  html: string | null;
}

/** A message that this sender holds until its lease ends. */
export interface LeasedMail {
  id: number;
  messageId: string;
  kind: string;
  /** Null: resolved by kind at sending. */
  recipient: string | null;
  subject: string;
  text: string | null;
  html: string | null;
  complaintReplyId: number | null;
  attempts: number;
  createdAt: Date;
}

/** Puts a message into the outbox and answers its id; null when one with the same key is there already. */
export async function insertMail(mail: NewMail, transaction: Connection): Promise<number | null> {
  const now = new Date();
  try {
    const [id] = await transaction('outbox').insert({
      message_id: mail.messageId,
      dedupe_key: mail.dedupeKey,
      network_id: mail.networkId,
      kind: mail.kind,
      recipient: mail.recipient,
      subject: mail.subject.slice(0, 300),
      text_body: mail.text,
      html_body: mail.html,
      next_attempt_at: now,
      created_at: now,
    });
    return Number(id);
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    return null;
  }
}

/** Nothing waits or is held longer: what would, was put off by a clock that was ahead. Far more than senders' clocks differ by. */
const LONGEST_WAIT_MS = 2 * 3_600_000;

/**
 * Takes the message that is due longest and that nobody holds, for `leaseSec` seconds. Two senders never get the same one. Times that lie
 * further ahead than any wait or lease count as past.
 */
export async function leaseDueMail(
  holder: string,
  now: Date,
  leaseSec: number,
): Promise<LeasedMail | undefined> {
  return inTransaction(
    async (transaction) => {
      const mail: LeasedMail | undefined = await transaction('outbox')
        .where({ state: 'waiting' })
        .where((query) =>
          query
            .where('next_attempt_at', '<=', now)
            .orWhere('next_attempt_at', '>', new Date(now.getTime() + LONGEST_WAIT_MS)),
        )
        .where((query) =>
          query
            .whereNull('leased_until')
            .orWhere('leased_until', '<', now)
            .orWhere('leased_until', '>', new Date(now.getTime() + LONGEST_WAIT_MS)),
        )
        .orderBy(['next_attempt_at', 'id'])
        .forUpdate()
        .skipLocked()
        .first({
          id: 'id',
          messageId: 'message_id',
          kind: 'kind',
          recipient: 'recipient',
          subject: 'subject',
          text: 'text_body',
          html: 'html_body',
          complaintReplyId: 'complaint_reply_id',
          attempts: 'attempts',
          createdAt: 'created_at',
        });
      if (!mail) return undefined;
      await transaction('outbox')
        .where({ id: mail.id })
        .update({ leased_until: new Date(now.getTime() + leaseSec * 1000), lease_holder: holder });
      return mail;
    },
    // Locks no gap that new messages are put into.
    { isolationLevel: 'read committed' },
  );
}

/** Notes that a message was handed over. */
export async function markMailSent(id: number, holder: string, conn: Connection): Promise<void> {
  await conn('outbox')
    .where({ id, lease_holder: holder, state: 'waiting' })
    .update({
      state: 'sent',
      sent_at: new Date(),
      leased_until: null,
      attempts: conn.raw('attempts + 1'),
      last_error: null,
    });
}

/** Notes a failed attempt: tried again at `nextAttemptAt`, or given up when that is null. */
export async function markMailFailed(
  id: number,
  holder: string,
  error: string,
  nextAttemptAt: Date | null,
  conn: Connection,
): Promise<void> {
  await conn('outbox')
    .where({ id, lease_holder: holder, state: 'waiting' })
    .update({
      leased_until: null,
      attempts: conn.raw('attempts + 1'),
      last_error: error.slice(0, 500),
      ...(nextAttemptAt ? { next_attempt_at: nextAttemptAt } : { state: 'dead' }),
    });
}

/** Forgets a message that this sender holds, as if it had never been asked for. */
export async function deleteMail(id: number, conn: Connection): Promise<void> {
  await conn('outbox').where({ id, state: 'waiting' }).delete();
}
