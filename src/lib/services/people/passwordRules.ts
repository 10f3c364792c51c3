import { dictionary } from '@zxcvbn-ts/language-common';

const PASSWORD_LEAST = 12;
/** Longer ones would only cost time to hash; nothing is cut off. */
const PASSWORD_MOST = 1000;
/** What is left of a password without the names that anybody knows must have as many characters. */
const LEAST_BESIDE_NAMES = 8;
/** Shorter parts of names occur in any words. */
const LEAST_NAME = 4;
const PRODUCT = 'bittern';

/** Whose password it is: names that a guess begins with. */
export interface PasswordContext {
  email: string;
  name: string;
  /** Names and short names of the networks that the person belongs to. */
  networks: readonly string[];
}

let common: ReadonlySet<string> | undefined;

/**
 * What is wrong with a new password, in words that follow its name, or null. Length, common passwords, and names of the place are
 * all that is judged: any characters may be used, and none must be (OWASP ASVS 5.0, 6.2).
 */
export function passwordProblem(password: string, context: PasswordContext): string | null {
  const length = [...password].length;
  if (length < PASSWORD_LEAST) return `must have at least ${PASSWORD_LEAST} characters`;
  if (length > PASSWORD_MOST) return 'must have at most 1,000 characters';
  const folded = password.toLowerCase();
  if (isMonotonous(folded)) return 'repeats itself or counts up: choose one that cannot be guessed';
  if (isCommon(folded)) return 'is among the passwords that are tried first: choose other words';
  const rest = withoutNames(folded, namesOf(context));
  if (rest !== folded && (rest.length < LEAST_BESIDE_NAMES || isMonotonous(rest) || isCommon(rest))) {
    return 'is made of names that anybody knows, such as yours or the network’s: choose other words';
  }
  return null;
}

/** Whether a text, or what is left of it without digits and signs around it, is a common password. */
function isCommon(folded: string): boolean {
  common ??= new Set(dictionary['passwords-common'].map((entry) => entry.toLowerCase()));
  const core = folded.replace(/^[^\p{L}]+|[^\p{L}]+$/gu, '');
  return common.has(folded) || common.has(core);
}

/** Whether a text is one piece over and over, or each character is the one after (or before) the one before it. */
function isMonotonous(folded: string): boolean {
  const characters = [...folded];
  const steps = characters
    .slice(1)
    .map((character, at) => (character.codePointAt(0) ?? 0) - (characters[at]?.codePointAt(0) ?? 0));
  const isRun = steps.length > 0 && [1, -1].some((one) => steps.every((step) => step === one));
  return isRun || /^(.{1,6}?)\1+$/su.test(folded);
}

function namesOf({ email, name, networks }: PasswordContext): string[] {
  const [local = '', domain = ''] = email.toLowerCase().split('@');
  const words = [...networks, name, local, domain].flatMap((text) =>
    text.toLowerCase().split(/[^\p{L}\p{N}]+/u),
  );
  const all = [PRODUCT, email.toLowerCase(), local, ...words].filter((word) => word.length >= LEAST_NAME);
  return [...new Set(all)].sort((a, b) => b.length - a.length);
}

/** The text without the names; where one stood, signs and digits around it go, too. */
function withoutNames(folded: string, names: readonly string[]): string {
  const rest = names.reduce((text, name) => text.replaceAll(name, ' '), folded);
  return rest === folded ? folded : rest.replace(/[^\p{L}\p{N}]+/gu, '');
}
