import { purposeMac } from '../purposeMac';
import {
  contentDigest,
  hmacSha256,
  signatureBase,
  signatureParameters,
  type Component,
} from './messageSignature';

/** The secret that a webhook's receiver checks signatures with: 32 bytes in base64, derived anew whenever they are needed. */
export function webhookSecret(salt: Buffer): string {
  return purposeMac('webhook secret', salt.toString('hex')).toString('base64');
}

/** A post to a webhook, as it is sent. */
export interface WebhookPost {
  webhookId: number;
  url: string;
  body: string;
  secret: string;
}

/**
 * The fields that sign a post: an HTTP message signature (RFC 9421) by hmac-sha256 over method, address and the body's digest
 * (RFC 9530), labelled `bittern`. Its time, `nowSec`, lets a receiver refuse what was recorded and sent again later.
 */
export function signatureFields({ webhookId, url, body, secret }: WebhookPost, nowSec: number) {
  const digest = contentDigest(body);
  const covered: Component[] = [
    ['@method', 'POST'],
    ['@target-uri', targetUri(url)],
    ['content-digest', digest],
  ];
  const parameters = signatureParameters(covered, {
    created: nowSec,
    keyid: `webhook-${webhookId}`,
    alg: 'hmac-sha256',
  });
  const signature = hmacSha256(Buffer.from(secret, 'base64'), signatureBase(covered, parameters));
  return {
    'Content-Digest': digest,
    'Signature-Input': `bittern=${parameters}`,
    Signature: `bittern=:${signature}:`,
  };
}

/** An address as a request names it, so without a fragment, its host in lower case, a path at least `/` (RFC 9421, section 2.2.2). One that is none is left as it is: posting tells what is wrong with it. */
function targetUri(address: string): string {
  if (!URL.canParse(address)) return address;
  const url = new URL(address);
  url.hash = '';
  return url.href;
}
