import { type NetworkRow } from '#db/queries/networks';
import { type SignInRules } from '#lib/contracts/secondFactor';
import { Problem } from '#lib/http/problem';
import { changeSignInRules } from '#lib/services/networks/signInRules';

/** Says what signing in to a network asks for. @throws {Problem} 409 for somebody without what others would be asked for. */
export async function changeRules(network: NetworkRow, rules: SignInRules, userId: string): Promise<void> {
  if ((await changeSignInRules(network, rules, userId)) === 'changed') return;
  const detail =
    'Set up your own second factor first, under “Your account”: without one you would be kept out. Nothing was changed.';
  throw new Problem(409, 'own-factor-first', 'Not possible', detail);
}
