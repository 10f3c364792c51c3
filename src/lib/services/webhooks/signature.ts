import { createHmac } from 'node:crypto';
import { purposeMac } from '../purposeMac';

/** The secret that a webhook's receiver checks signatures with; derived anew whenever it is needed. */
export function webhookSecret(salt: Buffer): string {
  return `wh_${purposeMac('webhook secret', salt.toString('hex')).toString('base64url')}`;
}

/**
 * Value of the header Bittern-Signature: `t=<epoch seconds>,v1=<hex>`, the HMAC-SHA-256 under the secret of the time, a dot and the
 * body as sent. The time lets a receiver refuse what was recorded and sent again later.
 */
export function signatureHeader(secret: string, body: string, nowSec: number): string {
  return `t=${nowSec},v1=${createHmac('sha256', secret).update(`${nowSec}.${body}`).digest('hex')}`;
}
