import { recoveryHashesOf, takeCode, takeRecoveryCode } from '#lib/services/people/secondFactor';
import { hashOfRecoveryCode } from './recoveryCodes';
import { Throttle } from './throttle';

export type FactorCheck = { outcome: 'fits' | 'wrong' } | { outcome: 'too-many'; retryAfterSec: number };

/**
 * Wrong codes count by person, from wherever they come: a code has a million values, and only who has the password gets to guess.
 * A browser that has signed the person in before, or is signed in, has a budget of its own.
 */
const tries = new Throttle({ free: 5, firstSec: 15, mostSec: 900, forgetSec: 86_400 });

/** Whether a code is the authenticator's, not taken before, or, where asked for, one of the recovery codes that are left. */
export async function checkFactor(
  person: { id: string; email: string },
  typed: string,
  { ownDevice, recovery }: { ownDevice: string | null; recovery: boolean },
): Promise<FactorCheck> {
  const key = ownDevice === null ? person.id : `${person.id} ${ownDevice}`;
  const retryAfterSec = tries.waitSec(key, Date.now());
  if (retryAfterSec > 0) return { outcome: 'too-many', retryAfterSec };
  tries.count(key, Date.now());
  const fits = await isRight(person, typed, recovery);
  if (fits) tries.forget(key);
  return { outcome: fits ? 'fits' : 'wrong' };
}

async function isRight(
  person: { id: string; email: string },
  typed: string,
  recovery: boolean,
): Promise<boolean> {
  const digits = typed.replace(/\s/g, '');
  if (/^\d{6}$/.test(digits)) return takeCode(person.id, digits, Math.floor(Date.now() / 1000));
  if (!recovery) return false;
  const hash = await hashOfRecoveryCode(typed, await recoveryHashesOf(person.id));
  return hash !== null && takeRecoveryCode(person, hash);
}
