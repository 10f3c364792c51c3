import { createHmac, timingSafeEqual } from 'node:crypto';
import { config } from '#lib/config/index';

/** HMAC-SHA-256 of a text. The settings' key signs nothing itself: each purpose has a key of its own, derived from it (or, where it is exchanged, from `root`). */
export function purposeMac(purpose: string, text: string, root: Buffer = config().personalDataKey): Buffer {
  const key = createHmac('sha256', root).update(purpose).digest();
  return createHmac('sha256', key).update(text).digest();
}

/** Whether two signatures are the same, told in a time that does not depend on where they differ. */
export function isSameSignature(a: string, b: string): boolean {
  const [left, right] = [Buffer.from(a), Buffer.from(b)];
  return left.length === right.length && timingSafeEqual(left, right);
}
