import { createCipheriv, createDecipheriv, randomBytes } from 'node:crypto';

const VERSION = 1;
const NONCE_BYTES = 12;
const TAG_BYTES = 16;
const HEAD_BYTES = 1 + NONCE_BYTES + TAG_BYTES;

/**
 * Seals bytes with AES-256-GCM under a key of 32 bytes: version (1 byte, 1), nonce (12), tag (16), ciphertext. `place` says what
 * they are and whose; it is authenticated with them, so that no row opens in another's place.
 */
export function sealBytes(key: Buffer, place: string, plain: Buffer): Buffer {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv('aes-256-gcm', key, nonce);
  cipher.setAAD(Buffer.from(place));
  const ciphertext = Buffer.concat([cipher.update(plain), cipher.final()]);
  return Buffer.concat([Buffer.of(VERSION), nonce, cipher.getAuthTag(), ciphertext]);
}

/** The bytes that `sealBytes` sealed. @throws {Error} for another key, another place, or changed bytes. */
export function openSealed(key: Buffer, place: string, sealed: Buffer): Buffer {
  if (sealed.length < HEAD_BYTES || sealed[0] !== VERSION) throw new Error('These are no sealed bytes.');
  const nonce = sealed.subarray(1, 1 + NONCE_BYTES);
  const decipher = createDecipheriv('aes-256-gcm', key, nonce, { authTagLength: TAG_BYTES });
  decipher.setAAD(Buffer.from(place));
  decipher.setAuthTag(sealed.subarray(1 + NONCE_BYTES, HEAD_BYTES));
  return Buffer.concat([decipher.update(sealed.subarray(HEAD_BYTES)), decipher.final()]);
}
