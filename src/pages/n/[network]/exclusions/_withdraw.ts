import { withdrawalSchema } from '#lib/contracts/exclusions';
import { submitForm, type Submission } from '#lib/http/forms';
import { badRequest, notFound } from '#lib/http/problem';
import { withdraw, withdrawAct } from '#lib/services/exclusions/withdraw';

const WHAT = /^(act|one)-(\d{1,9})$/;

/** Withdraws what the list's form names: one exclusion, or every one of an act. */
export function withdrawFromList(
  request: Request,
  by: { networkId: number; userId: string },
): Promise<Submission<string>> {
  return submitForm(request, async ({ text }) => {
    const { reason } = withdrawalSchema.parse({ reason: text['reason'] });
    const [, kind, number] = WHAT.exec(text['what'] ?? '') ?? [];
    if (!kind) throw badRequest('The form did not say what to withdraw. Nothing was changed.');
    const asked = { ...by, id: Number(number), reason };
    const { outcome } = kind === 'act' ? await withdrawAct(asked) : await withdraw(asked);
    if (outcome === 'unknown') throw notFound('The network has no such exclusion. Nothing was changed.');
    // Withdrawn meanwhile by somebody else: what was wanted has come about.
    return outcome === 'withdrawn'
      ? 'Withdrawn: it counts again. Figures follow within a minute or two.'
      : 'Somebody had withdrawn it already.';
  });
}
