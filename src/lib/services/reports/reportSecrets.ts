import { createHash, randomBytes } from 'node:crypto';
import { isSameSignature, purposeMac } from '../purposeMac';

/** A person needs at least this long to fill in the form; a program does not. */
const LEAST_FILL_SEC = 4;
const LONGEST_FILL_SEC = 12 * 3600;

const STAMP = /^(\d{1,12})\.([A-Za-z0-9_-]{22})\.([A-Za-z0-9_-]{43})$/;

export type StampState = { kind: 'good'; nonce: string } | { kind: 'too-fast' } | { kind: 'expired' };

/** A signed mark of when a network's form was handed out: it holds off programs without keeping anything here. */
function newStamp(networkId: number, nowSec: number): string {
  const nonce = randomBytes(16).toString('base64url');
  return `${nowSec}.${nonce}.${signature(networkId, String(nowSec), nonce)}`;
}

/** The stamp of a form that is shown again: the one that came, as long as it holds, else a new one. */
export function renewedStamp(stamp: string, networkId: number, nowSec: number): string {
  return checkStamp(stamp, networkId, nowSec).kind === 'expired' ? newStamp(networkId, nowSec) : stamp;
}

/** Judges the stamp that came back; one that is none, or of another network, counts as expired. */
export function checkStamp(stamp: string, networkId: number, nowSec: number): StampState {
  const [, issuedAtSec = '', nonce = '', signed = ''] = STAMP.exec(stamp) ?? [];
  if (!issuedAtSec || !isSameSignature(signed, signature(networkId, issuedAtSec, nonce)))
    return { kind: 'expired' };
  const tookSec = nowSec - Number(issuedAtSec);
  if (tookSec > LONGEST_FILL_SEC) return { kind: 'expired' };
  return tookSec < LEAST_FILL_SEC ? { kind: 'too-fast' } : { kind: 'good', nonce };
}

/**
 * The key of a report's private page. The same form sent twice gives the same key, so that it becomes one complaint; nobody
 * can work a key out without the settings' secret.
 */
export function privateKeyOf(nonce: string, content: unknown): string {
  return purposeMac('report key', `${nonce}\n${JSON.stringify(content)}`).toString('base64url');
}

/** What is kept of a private key. */
export function keyDigestOf(key: string): Buffer {
  return createHash('sha256').update(key).digest();
}

/** What is kept of a sender's address: it changes by the day and cannot be turned back. */
export function addressDigestOf(address: string, now: Date): Buffer {
  return purposeMac('report address', `${now.toISOString().slice(0, 10)} ${address}`).subarray(0, 16);
}

function signature(networkId: number, issuedAtSec: string, nonce: string): string {
  return purposeMac('report stamp', `${networkId}.${issuedAtSec}.${nonce}`).toString('base64url');
}
