import { expect, test } from 'vitest';
import { isFromBittern } from '#components/alerts/receiverExample.js';
import {
  contentDigest,
  hmacSha256,
  signatureBase,
  signatureParameters,
  type Component,
} from '#lib/services/webhooks/messageSignature';
import { signatureFields } from '#lib/services/webhooks/signature';

/** RFC 9421, appendices B.1.5 (the secret) and B.2.5 (base, fields and signature). */
test('the example of RFC 9421 by hmac-sha256', () => {
  const covered: Component[] = [
    ['date', 'Tue, 20 Apr 2021 02:07:55 GMT'],
    ['@authority', 'example.com'],
    ['content-type', 'application/json'],
  ];
  const secret = Buffer.from(
    'uzvJfB4u3N0Jy4T7NZ75MDVcr8zSTInedJtkgcu46YW4XByzNJjxBdtjUkdJPBtbmHhIDi6pcl8jsasjlTMtDQ==',
    'base64',
  );
  const parameters = signatureParameters(covered, { created: 1618884473, keyid: 'test-shared-secret' });
  expect(parameters).toBe(
    '("date" "@authority" "content-type");created=1618884473;keyid="test-shared-secret"',
  );
  const base = signatureBase(covered, parameters);
  expect(base).toBe(
    `"date": Tue, 20 Apr 2021 02:07:55 GMT
"@authority": example.com
"content-type": application/json
"@signature-params": ("date" "@authority" "content-type");created=1618884473;keyid="test-shared-secret"`,
  );
  expect(hmacSha256(secret, base)).toBe('pxcQw6G3AjtMBQjwo8XzkZf/bws5LelbaMk5rGIGtE8=');
});

/** RFC 9530, appendix B.1. */
test('the example of RFC 9530 by sha-256', () => {
  expect(contentDigest('{"hello": "world"}\n')).toBe(
    'sha-256=:RK/0qy18MlBSVnWgjwz6lZEWjP/lF5HF9bvEF8FabDg=:',
  );
});

const secret = Buffer.alloc(32, 7).toString('base64');
const post = { webhookId: 12, url: 'https://Quay.example/noise?to=desk#top', body: '{"level":57.4}', secret };
const nowSec = () => Math.floor(Date.now() / 1000);
const received = (fields: Record<string, string>) =>
  Object.fromEntries(Object.entries(fields).map(([name, value]) => [name.toLowerCase(), value]));

test('a post says what its signature covers, by the address as a request names it', () => {
  expect(signatureFields(post, 1_700_000_000)).toMatchObject({
    'Signature-Input':
      'bittern=("@method" "@target-uri" "content-digest");created=1700000000;keyid="webhook-12";alg="hmac-sha256"',
    Signature: `bittern=:${hmacSha256(
      Buffer.alloc(32, 7),
      `"@method": POST
"@target-uri": https://quay.example/noise?to=desk
"content-digest": ${contentDigest(post.body)}
"@signature-params": ("@method" "@target-uri" "content-digest");created=1700000000;keyid="webhook-12";alg="hmac-sha256"`,
    )}:`,
  });
});

/** The example that the page shows is the file that runs here. */
test('the example for receivers takes what was sent, and nothing that is another body, address, secret or time', () => {
  const headers = received(signatureFields(post, nowSec()));
  const address = 'https://quay.example/noise?to=desk';
  const takes = (more: Partial<typeof post> & { headers?: Record<string, string> } = {}) =>
    isFromBittern(
      more.headers ?? headers,
      more.body ?? post.body,
      more.url ?? address,
      more.secret ?? secret,
    );
  expect(takes()).toBe(true);
  expect(takes({ body: '{"level":47.4}' })).toBe(false);
  expect(takes({ url: 'https://quay.example/other' })).toBe(false);
  expect(takes({ secret: Buffer.alloc(32, 8).toString('base64') })).toBe(false);
  expect(takes({ headers: received(signatureFields(post, nowSec() - 301)) })).toBe(false);
  const later = headers['signature-input']?.replace(/created=\d+/, `created=${nowSec() + 60}`) ?? '';
  expect(takes({ headers: { ...headers, 'signature-input': later } })).toBe(false);
  const less = headers['signature-input']?.replace(' "content-digest"', '') ?? '';
  expect(takes({ headers: { ...headers, 'signature-input': less } })).toBe(false);
  expect(takes({ headers: {} })).toBe(false);
});
