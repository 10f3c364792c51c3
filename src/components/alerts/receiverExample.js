import { createHash, createHmac, timingSafeEqual } from 'node:crypto';

const MOST_AGE_SEC = 300;

/**
 * headers: with names in lower case; body: the bytes as they came, before anything parses them;
 * address: where events are posted to; secret: as it was shown when the webhook was added.
 */
export function isFromBittern(headers, body, address, secret) {
  const [, parameters, created] =
    /^bittern=(\("@method" "@target-uri" "content-digest"\);created=(\d+);.+)$/.exec(
      headers['signature-input'],
    ) ?? [];
  const [, signature] = /^bittern=:([\w+/=]+):$/.exec(headers['signature']) ?? [];
  if (!parameters || !signature) return false;
  const base = [
    '"@method": POST',
    `"@target-uri": ${new URL(address).href}`,
    `"content-digest": sha-256=:${createHash('sha256').update(body).digest('base64')}:`,
    `"@signature-params": ${parameters}`,
  ].join('\n');
  const expected = createHmac('sha256', Buffer.from(secret, 'base64')).update(base).digest();
  const given = Buffer.from(signature, 'base64');
  const isRecent = Math.abs(Date.now() / 1000 - Number(created)) <= MOST_AGE_SEC;
  return isRecent && given.length === expected.length && timingSafeEqual(given, expected);
}
