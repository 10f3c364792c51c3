import { config } from '#lib/config/index';
import { isSameSignature, purposeMac } from '../purposeMac';

const PURPOSE = 'acknowledge by mail link';
/** A link holds for so long after its message was written. */
export const LINK_DAYS = 7;

const TOKEN = /^(\d{1,10})\.([0-9a-f-]{36})\.(\d{1,12})\.([A-Za-z0-9_-]{43})$/;

/** What a link lets its holder do: acknowledge one exceedance as one person, until an instant. */
export interface LinkClaim {
  exceedanceId: number;
  userId: string;
  untilSec: number;
}

/** Address by which a person acknowledges one exceedance without signing in, until some days from now. */
export function acknowledgeUrl(exceedanceId: number, userId: string, nowSec: number): string {
  const claim = { exceedanceId, userId, untilSec: nowSec + LINK_DAYS * 86_400 };
  return `${config().origin}/acknowledge/${textOf(claim)}.${signatureOf(claim)}`;
}

/** What a link claims; null where it is not ours or was changed. Whether it still holds is for the reader to judge. */
export function readLink(token: string): LinkClaim | null {
  const [, exceedanceId = '', userId = '', untilSec = '', signed = ''] = TOKEN.exec(token) ?? [];
  const claim = { exceedanceId: Number(exceedanceId), userId, untilSec: Number(untilSec) };
  return signed !== '' && isSameSignature(signed, signatureOf(claim)) ? claim : null;
}

function textOf({ exceedanceId, userId, untilSec }: LinkClaim): string {
  return `${exceedanceId}.${userId}.${untilSec}`;
}

function signatureOf(claim: LinkClaim): string {
  return purposeMac(PURPOSE, textOf(claim)).toString('base64url');
}
