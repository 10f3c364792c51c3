import type { Transporter } from 'nodemailer';
import { pool } from '#db/queries/connection';
import { leaseDueMail, markMailFailed, markMailSent, type LeasedMail } from '#db/queries/outbox';
import { waitMs } from './backOff';

/** What a message says and to whom, where the outbox row does not hold it itself; null: there is nothing to send any more. */
export type MailResolver = (mail: LeasedMail) => Promise<MailBody | null>;

export interface MailBody {
  to: string;
  subject: string;
  text: string;
  html: string;
  /** Where an answer goes; left out: to the sender. One address, whatever characters it holds. */
  replyTo?: { name: string; address: string };
  /** Message-IDs of earlier messages to the same person about the same thing. */
  references?: string[];
  attachments?: { filename: string; content: Buffer; contentType: string }[];
}

export interface SenderSettings {
  transport: Pick<Transporter, 'sendMail'>;
  from: string;
  /** Names this process; a lease is its own only. */
  holder: string;
  resolvers: Record<string, MailResolver>;
  /** 0 to 1, by which waits are scattered. */
  random?: () => number;
}

/** An attempt that takes longer is broken off. */
const ATTEMPT_SEC = 90;
/** Longer than an attempt can take, so that no other sender takes a message that is on its way. */
const LEASE_SEC = 150;
const GIVE_UP_AFTER_SEC = 5 * 86_400;
/** What was tried less often is not given up: it waited for a sender, or a person has it tried again. */
const LEAST_ATTEMPTS = 8;

/**
 * Sends the message that is due longest: at least once, under a fixed Message-ID. A failure is tried again after a wait that
 * doubles up to about an hour, for five days; then the message is dead and stays visible until a person has it tried again.
 * @returns how many were tried: 1, or 0 when none is due.
 */
export async function sendDueMail(settings: SenderSettings, now: Date): Promise<number> {
  const mail = await leaseDueMail(settings.holder, now, LEASE_SEC);
  if (!mail) return 0;
  await sendOne(mail, settings, now);
  return 1;
}

async function sendOne(mail: LeasedMail, settings: SenderSettings, now: Date): Promise<void> {
  const { transport, from, holder } = settings;
  try {
    const body = await bodyOf(mail, settings);
    if (!body) {
      await markMailFailed(mail.id, holder, 'There is nothing to send any more.', null, pool());
      return;
    }
    const { to, ...content } = body;
    await transport.sendMail({
      ...content,
      from,
      // One address, whatever characters it holds: never a list.
      to: { name: '', address: to },
      messageId: mail.messageId,
      date: mail.createdAt,
      signal: AbortSignal.timeout(ATTEMPT_SEC * 1000),
    });
  } catch (error) {
    await markMailFailed(
      mail.id,
      holder,
      reasonOf(error, mail),
      nextAttemptAt(mail, now, settings.random ?? Math.random),
      pool(),
    );
    return;
  }
  await markMailSent(mail.id, holder, pool());
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

function nextAttemptAt({ attempts, createdAt }: LeasedMail, now: Date, random: () => number): Date | null {
  const isOld = now.getTime() - createdAt.getTime() > GIVE_UP_AFTER_SEC * 1000;
  if (isOld && attempts + 1 >= LEAST_ATTEMPTS) return null;
  return new Date(now.getTime() + waitMs(attempts, random));
}
