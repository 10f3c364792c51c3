import { createHash } from 'node:crypto';

/** What is stored of a secret of at least 112 random bits: a copy of the table opens nothing. */
export function secretDigest(secret: string): Buffer {
  return createHash('sha256').update(secret).digest();
}
