import { setTimeout as sleep } from 'node:timers/promises';
import { inject } from 'vitest';

export interface ReceivedMail {
  /** In the stand-in. */
  id: string;
  messageId: string;
  from: string;
  to: string;
  subject: string;
  text: string;
  html: string;
}

/** Waits until the stand-in mailbox holds a message to an address that fits, and answers it. */
export async function mailTo(
  address: string,
  fits: (mail: ReceivedMail) => boolean = () => true,
  timeoutMs = 60_000,
): Promise<ReceivedMail> {
  const deadline = Date.now() + timeoutMs;
  while (Date.now() < deadline) {
    const response = await fetch(`${inject('mailOrigin')}/api/messages?to=${encodeURIComponent(address)}`);
    const found = ((await response.json()) as ReceivedMail[]).find(fits);
    if (found) return found;
    await sleep(500);
  }
  throw new Error(`No such message to ${address} arrived within ${timeoutMs / 1000} s.`);
}
