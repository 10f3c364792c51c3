import { createHash } from 'node:crypto';
import { config } from '#lib/config/index';

/** The Message-ID of a message: the same for the same cause and recipient, at every attempt and after every crash. */
export function messageIdOf(dedupeKey: string): string {
  const digest = createHash('sha256').update(dedupeKey).digest('hex').slice(0, 32);
  return `<${digest}@${new URL(config().origin).hostname}>`;
}
