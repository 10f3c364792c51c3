import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { countMails, listMails, retryMails, type MailRow, type MailState } from '#db/queries/outboxState';
import { done, unknown, type Outcome } from '../outcome';

export const MAIL_STATES: readonly MailState[] = ['dead', 'waiting', 'sent'];
/** Messages sent are counted over so many days. */
export const SENT_DAYS = 7;
const PAGE_SIZE = 50;

export interface MailPage {
  counts: Record<MailState, number>;
  mails: MailRow[];
  /** Where the next page goes on; null: nothing is left. */
  beforeId: number | null;
}

/** A network's messages in a state, latest first, beside how many there are in each. */
export async function mailPage(
  networkId: number,
  state: MailState,
  beforeId: number | null,
  now: Date,
): Promise<MailPage> {
  const sentSince = new Date(now.getTime() - SENT_DAYS * 86_400_000);
  const [counts, rows] = await Promise.all([
    countMails(networkId, sentSince),
    listMails(networkId, state, { limit: PAGE_SIZE + 1, beforeId }),
  ]);
  const mails = rows.slice(0, PAGE_SIZE);
  return { counts, mails, beforeId: rows.length > PAGE_SIZE ? (mails.at(-1)?.id ?? null) : null };
}

/** Has one message tried again at once, or every one that was given up (`id` null). Answers how many. */
export function retryMail(
  who: { networkId: number; userId: string },
  id: number | null,
  now: Date,
): Promise<Outcome<number>> {
  return inTransaction(async (transaction) => {
    const count = await retryMails(who.networkId, id, now, transaction);
    if (count === 0) return unknown('No message here waits to be sent again: it was sent meanwhile.');
    await appendAudit(
      {
        ...who,
        action: 'mail.resend',
        subject: id === null ? `network ${who.networkId}` : `mail ${id}`,
        detail: { count },
      },
      transaction,
    );
    return done(count);
  });
}
