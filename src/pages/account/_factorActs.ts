import { beginOwnFactor, confirmOwnFactor, endOwnFactor, remakeRecoveryCodes } from '#lib/auth/ownFactor';
import type { SignedInUser } from '#lib/auth/sessions';
import { factorCodeSchema, factorEndSchema } from '#lib/contracts/secondFactor';
import { typedExactly, type FormValues } from '#lib/http/forms';
import { badRequest } from '#lib/http/problem';

export const FACTOR_DONE = {
  on: 'The second factor is in force: from now on signing in asks for a code.',
  codes: 'New recovery codes are made; the earlier ones open nothing any more.',
  ended: 'The second factor is taken away. Signing in asks for your password alone.',
} as const;

export interface FactorAct {
  /** Null: there is nothing to tell but what the page shows. */
  done: keyof typeof FACTOR_DONE | null;
  /** To be shown once. */
  codes: string[];
}

/** Does what a form of the page asks. @throws {Problem} 4xx, and zod errors, with what is wrong by field. */
export async function actOnFactor(
  values: FormValues,
  { user, sessionId }: { user: SignedInUser; sessionId: string },
): Promise<FactorAct> {
  const code = () => factorCodeSchema.parse({ code: values.text['code'] ?? '' }).code;
  switch (values.text['act']) {
    case 'begin':
      await beginOwnFactor(user);
      return { done: null, codes: [] };
    case 'confirm':
      return { done: 'on', codes: await confirmOwnFactor(user, code(), sessionId) };
    case 'codes':
      return { done: 'codes', codes: await remakeRecoveryCodes(user, code(), sessionId) };
    case 'end':
      await endOwnFactor(
        user,
        factorEndSchema.parse({ password: typedExactly(values, 'password') }).password,
      );
      return { done: 'ended', codes: [] };
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}
