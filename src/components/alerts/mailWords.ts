import { formatInstantShort } from '#lib/format/times';

/** What stands over each list of messages. */
export const MAIL_STATE_WORDS = {
  dead: 'Could not be delivered',
  waiting: 'Waiting',
  sent: 'Sent',
} as const;
export type MailState = keyof typeof MAIL_STATE_WORDS;

const KIND_WORDS: Readonly<Record<string, string>> = {
  exceedances: 'Exceedance',
  escalation: 'Escalation',
  'early-warning': 'Early warning',
  health: 'Health',
  webhook: 'Webhook given up',
  'calibration-due': 'Calibration due',
  'complaint-reply': 'Answer to a complaint',
};

/** What a message is about, in words. */
export function mailKindWords(kind: string): string {
  return KIND_WORDS[kind] ?? kind;
}

interface Told {
  state: MailState;
  attempts: number;
  nextAttemptAt: Date;
  sentAt: Date | null;
}

/** How a message fares: "tried 3 times, again at 1 Dec 16:20". */
export function mailProgressWords({ state, attempts, nextAttemptAt, sentAt }: Told, zone: string): string {
  const at = (date: Date) => formatInstantShort(Math.floor(date.getTime() / 60_000) * 60, zone);
  if (state === 'sent') return sentAt ? `sent ${at(sentAt)}` : 'sent';
  const tried = `tried ${attempts === 1 ? 'once' : `${attempts} times`}`;
  if (state === 'dead') return `${tried}, given up`;
  return attempts === 0 ? `is due ${at(nextAttemptAt)}` : `${tried}, again at ${at(nextAttemptAt)}`;
}
