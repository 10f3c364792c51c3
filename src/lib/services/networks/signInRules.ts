import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { listSecondFactorNetworks, requireSecondFactor, type NetworkRow } from '#db/queries/networks';
import { hasSecondFactor } from '#db/queries/secondFactors';
import { type SignInRules } from '#lib/contracts/secondFactor';

/** What signing in to a network asks for. */
export async function signInRulesOf(network: NetworkRow): Promise<SignInRules> {
  return { secondFactorRequired: (await listSecondFactorNetworks()).includes(network.id) };
}

/**
 * Says what signing in to a network asks for, from the next request on. Whoever begins to ask others for a second factor must have
 * one: `own-factor-first`.
 */
export function changeSignInRules(
  network: NetworkRow,
  { secondFactorRequired }: SignInRules,
  userId: string,
): Promise<'changed' | 'own-factor-first'> {
  return inTransaction(async (transaction) => {
    if (secondFactorRequired && !(await hasSecondFactor(userId, transaction))) return 'own-factor-first';
    if (await requireSecondFactor(network.id, secondFactorRequired, transaction)) {
      const subject = `network ${network.slug}`;
      const detail = { before: !secondFactorRequired, after: secondFactorRequired };
      const entry = { userId, networkId: network.id, action: 'network.second-factor', subject, detail };
      await appendAudit(entry, transaction);
    }
    return 'changed';
  });
}
