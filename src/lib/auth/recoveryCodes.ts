import { randomCode } from './firstPassword';
import { hashPassword, verifyPassword } from './passwords';

const CODES = 10;
const GROUPS = 3;
const GROUP_LENGTH = 4;

/** New recovery codes of 60 random bits, `k7wm-2tzh-…`, and the hashes to keep of them. */
export async function makeRecoveryCodes(): Promise<{ codes: string[]; hashes: string[] }> {
  const codes = Array.from({ length: CODES }, () => randomCode(GROUPS, GROUP_LENGTH));
  const hashes: string[] = [];
  for (const code of codes) hashes.push(await hashPassword(plainCode(code)));
  return { codes, hashes };
}

/** The hash among those left that a typed recovery code belongs to; null where it is none of them. */
export async function hashOfRecoveryCode(typed: string, hashes: readonly string[]): Promise<string | null> {
  const code = plainCode(typed);
  if (code.length !== GROUPS * GROUP_LENGTH) return null;
  for (const hash of hashes) if (await verifyPassword(hash, code)) return hash;
  return null;
}

/** Hyphens, spaces and capitals are how it was written down. */
const plainCode = (text: string) => text.toLowerCase().replace(/[\s-]/g, '');
