import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  beginSecondFactor,
  confirmSecondFactor,
  deleteSecondFactor,
  findSecondFactor,
  keepRecoveryHashes,
  lockSecondFactor,
  takeStep,
} from '#db/queries/secondFactors';
import { config } from '#lib/config/index';
import { openSealed, sealBytes } from '../sealing';
import { tellPerson, type AccountNews } from './accountMail';
import { matchingStep, newTotpSecret } from './totp';

interface Owner {
  id: string;
  email: string;
}

/** `isOn`: the person is asked for it; `isBegun`: a secret waits for its first code. */
export interface SecondFactorState {
  isOn: boolean;
  isBegun: boolean;
  recoveryCodesLeft: number;
}

export async function secondFactorOf(userId: string): Promise<SecondFactorState> {
  const row = await findSecondFactor(userId);
  return {
    isOn: row !== undefined && row.confirmedAt !== null,
    isBegun: row !== undefined && row.confirmedAt === null,
    recoveryCodesLeft: row?.recoveryHashes.length ?? 0,
  };
}

/** Makes a new secret, which is asked for only once a code of it was given. One that is asked for already stays. */
export function beginFactor(userId: string): Promise<void> {
  const sealed = sealBytes(config().personalDataKey, placeOf(userId), newTotpSecret());
  return inTransaction((transaction) => beginSecondFactor(userId, sealed, transaction));
}

/** The secret that waits for its first code, to be shown to its owner; null where none does. */
export async function begunSecret(userId: string): Promise<Buffer | null> {
  const row = await findSecondFactor(userId);
  return row && row.confirmedAt === null ? openSecret(userId, row.sealedSecret) : null;
}

/**
 * Whether a code is one of the person's authenticator now; a code that was taken, or an earlier one, is not taken again.
 */
export async function takeCode(userId: string, code: string, atSec: number): Promise<boolean> {
  const row = await findSecondFactor(userId);
  const secret = row ? openSecret(userId, row.sealedSecret) : null;
  const step = secret && matchingStep(secret, code, atSec);
  return step !== null && takeStep(userId, step);
}

/** Asks for the second factor from now on. Its first code was taken. */
export function confirmFactor(owner: Owner, recoveryHashes: readonly string[]): Promise<void> {
  return inTransaction(async (transaction) => {
    await confirmSecondFactor(owner.id, recoveryHashes, transaction);
    await note(owner, owner.id, 'second-factor.on', { kind: 'second-factor-on' }, transaction);
  });
}

/** Replaces the recovery codes: the earlier ones open nothing any more. */
export function replaceRecoveryCodes(owner: Owner, recoveryHashes: readonly string[]): Promise<void> {
  return inTransaction(async (transaction) => {
    await keepRecoveryHashes(owner.id, recoveryHashes, transaction);
    await note(owner, owner.id, 'second-factor.codes', { kind: 'recovery-codes' }, transaction);
  });
}

/** Hashes of the recovery codes that are left. */
export async function recoveryHashesOf(userId: string): Promise<string[]> {
  return (await findSecondFactor(userId))?.recoveryHashes ?? [];
}

/** Takes a recovery code by its hash, once; answers false where somebody was quicker. */
export function takeRecoveryCode(owner: Owner, hash: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const row = await lockSecondFactor(owner.id, transaction);
    const left = row?.recoveryHashes.filter((other) => other !== hash) ?? [];
    if (!row || left.length === row.recoveryHashes.length) return false;
    await keepRecoveryHashes(owner.id, left, transaction);
    const news = { kind: 'recovery-code-used', left: left.length } as const;
    await note(owner, owner.id, 'second-factor.recovery', news, transaction);
    return true;
  });
}

/** Takes a person's second factor away; answers whether there was one. The person is told. */
export function endFactor(owner: Owner, byUserId: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const isEnded = await deleteSecondFactor(owner.id, transaction);
    if (isEnded) {
      const by = owner.id === byUserId ? 'self' : 'administrator';
      const action = by === 'self' ? 'second-factor.off' : 'second-factor.reset';
      await note(owner, byUserId, action, { kind: 'second-factor-off', by }, transaction);
    }
    return isEnded;
  });
}

/** What is authenticated with a person's sealed secret. */
export const placeOf = (userId: string) => `person ${userId} second-factor 1`;

/** Null where it does not open: the setting that seals it is another one now. */
function openSecret(userId: string, sealed: Buffer): Buffer | null {
  try {
    return openSealed(config().personalDataKey, placeOf(userId), sealed);
  } catch {
    return null;
  }
}

async function note(
  owner: Owner,
  byUserId: string,
  action: string,
  news: AccountNews,
  transaction: Connection,
): Promise<void> {
  await tellPerson(owner.email, news, new Date(), transaction);
  const subject = `person ${owner.id}`;
  await appendAudit({ userId: byUserId, networkId: null, action, subject, detail: {} }, transaction);
}
