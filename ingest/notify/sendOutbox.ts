import type { Transporter } from 'nodemailer';
import { pool } from '#db/queries/connection';
import { leaseDueMail, markMailFailed, markMailSent, type LeasedMail } from '#db/queries/outbox';

/** What a message says and to whom, where the outbox row does not hold it itself; null: there is nothing to send any more. */
export type MailResolver = (mail: LeasedMail) => Promise<MailBody | null>;

export interface MailBody {
  to: string;
  subject: string;
  text: string;
  html: string;
}

export interface SenderSettings {
  transport: Pick<Transporter, 'sendMail'>;
  from: string;
  /** Names this process; a lease is its own only. */
  holder: string;
  resolvers: Record<string, MailResolver>;
}

const MAILS_A_ROUND = 10;
/** Longer than one attempt can take, so that no other sender takes a message that is on its way. */
const LEASE_SEC = 120;
const FIRST_WAIT_SEC = 60;
const LONGEST_WAIT_SEC = 3600;
const GIVE_UP_AFTER_SEC = 5 * 86_400;

/**
 * Sends messages that are due: at least once, under a fixed Message-ID. A failure is tried again after a wait that doubles up
 * to an hour, for five days; then the message is dead and stays visible.
 * @returns how many were handed over.
 */
export async function sendDueMail(settings: SenderSettings, now: Date): Promise<number> {
  const mails = await leaseDueMail(settings.holder, now, { limit: MAILS_A_ROUND, leaseSec: LEASE_SEC });
  let sent = 0;
  for (const mail of mails) if (await sendOne(mail, settings, now)) sent += 1;
  return sent;
}

async function sendOne(mail: LeasedMail, settings: SenderSettings, now: Date): Promise<boolean> {
  const { transport, from, holder } = settings;
  try {
    const body = await bodyOf(mail, settings);
    if (!body) {
      await markMailFailed(mail.id, holder, 'There is nothing to send any more.', null, pool());
      return false;
    }
    await transport.sendMail({ ...body, from, messageId: mail.messageId, date: mail.createdAt });
  } catch (error) {
    await markMailFailed(mail.id, holder, reasonOf(error, mail), nextAttemptAt(mail, now), pool());
    return false;
  }
  await markMailSent(mail.id, holder, pool());
  return true;
}

/** What went wrong. Where the row names no recipient, neither does this: a mail server's words usually repeat the address. */
function reasonOf(error: unknown, mail: LeasedMail): string {
  if (mail.recipient !== null) return error instanceof Error ? error.message : String(error);
  const { code, responseCode } = error as { code?: string; responseCode?: number };
  return ['Not delivered', code, responseCode].filter((part) => part !== undefined).join(', ');
}

async function bodyOf(mail: LeasedMail, { resolvers }: SenderSettings): Promise<MailBody | null> {
  if (mail.recipient !== null && mail.text !== null && mail.html !== null) {
    return { to: mail.recipient, subject: mail.subject, text: mail.text, html: mail.html };
  }
  const resolve = resolvers[mail.kind];
  if (!resolve) throw new Error(`Nothing is known of messages of the kind ${mail.kind}.`);
  return resolve(mail);
}

function nextAttemptAt({ attempts, createdAt }: LeasedMail, now: Date): Date | null {
  if (now.getTime() - createdAt.getTime() > GIVE_UP_AFTER_SEC * 1000) return null;
  const waitSec = Math.min(LONGEST_WAIT_SEC, FIRST_WAIT_SEC * 2 ** Math.min(attempts, 10));
  return new Date(now.getTime() + waitSec * 1000);
}
