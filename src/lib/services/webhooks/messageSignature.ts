import { createHash, createHmac } from 'node:crypto';

/** A part of a message that a signature covers: a field by its name in lower case, or what is derived from the message (`@method`); and its value. */
export type Component = readonly [name: string, value: string];

/** What stands beside a signature, in the order in which it is written. */
export interface SignatureParameters {
  /** When it was made, s since 1970. */
  created: number;
  keyid: string;
  alg?: 'hmac-sha256';
}

/** Value of the field Content-Digest: the SHA-256 of a body as it is sent (RFC 9530, section 2). */
export function contentDigest(body: string): string {
  return `sha-256=:${createHash('sha256').update(body).digest('base64')}:`;
}

/** What a signature covers and how it is made, as it stands behind its label in Signature-Input (RFC 9421, section 2.3). */
export function signatureParameters(covered: readonly Component[], parameters: SignatureParameters): string {
  const names = covered.map(([name]) => `"${name}"`).join(' ');
  const { created, keyid, alg } = parameters;
  return `(${names});created=${created};keyid="${keyid}"${alg ? `;alg="${alg}"` : ''}`;
}

/** The text that is signed: a line for each part, and the parameters at last (RFC 9421, section 2.5). */
export function signatureBase(covered: readonly Component[], parameters: string): string {
  const lines = covered.map(([name, value]) => `"${name}": ${value}`);
  return [...lines, `"@signature-params": ${parameters}`].join('\n');
}

/** HMAC-SHA-256 of a signature base, base64 (RFC 9421, section 3.3.3). */
export function hmacSha256(key: Buffer, base: string): string {
  return createHmac('sha256', key).update(base).digest('base64');
}
