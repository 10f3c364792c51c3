import { randomBytes } from 'node:crypto';
import { Secret, TOTP } from 'otpauth';

const ISSUER = 'Bittern';
const PERIOD_SEC = 30;
const DIGITS = 6;
/** RFC 4226 recommends 160 bits. */
const SECRET_BYTES = 20;
/** Steps of 30 s by which a clock may be off, either way. */
const WINDOW_STEPS = 1;

/** A new secret for an authenticator. */
export function newTotpSecret(): Buffer {
  return randomBytes(SECRET_BYTES);
}

/**
 * The time step (of 30 s since 1970) whose code this is, within one step of an instant; null where it is none of theirs. Codes by
 * RFC 6238 with HMAC-SHA-1, which every authenticator knows.
 */
export function matchingStep(secret: Buffer, code: string, atSec: number, digits = DIGITS): number | null {
  const delta = totpOf(secret, '', digits).validate({
    token: code,
    timestamp: atSec * 1000,
    window: WINDOW_STEPS,
  });
  return delta === null ? null : Math.floor(atSec / PERIOD_SEC) + delta;
}

/** The `otpauth:` address that an authenticator reads from a QR code. */
export function totpUri(secret: Buffer, account: string): string {
  return totpOf(secret, account).toString();
}

/** The secret to type into an authenticator: base 32 in groups of four. */
export function secretWords(secret: Buffer): string {
  const text = new Secret({ buffer: Uint8Array.from(secret).buffer }).base32;
  return text.match(/.{1,4}/g)?.join(' ') ?? text;
}

function totpOf(secret: Buffer, label: string, digits = DIGITS): TOTP {
  return new TOTP({
    issuer: ISSUER,
    label,
    algorithm: 'SHA1',
    digits,
    period: PERIOD_SEC,
    secret: new Secret({ buffer: Uint8Array.from(secret).buffer }),
  });
}
