import { appendAudit } from '#db/queries/audit';
import {
  readAnsweringSettings,
  writeAnsweringSettings,
  type AnsweringSettings,
} from '#db/queries/answeringSettings';
import { inTransaction } from '#db/queries/connection';
import { emailAddress } from '#lib/contracts/common';
import { done, invalid, type Outcome } from '../../outcome';

/** How a network answers. */
export function answeringSettings(networkId: number): Promise<AnsweringSettings> {
  return readAnsweringSettings(networkId);
}

/** Changes how a network answers. A reply address may hold `{reference}`, such as `desk+{reference}@merrow.example`. */
export async function changeAnswering(
  { networkId, userId }: { networkId: number; userId: string },
  settings: AnsweringSettings,
): Promise<Outcome<null>> {
  const address = settings.replyAddress;
  if (
    address !== null &&
    !emailAddress.safeParse(address.replaceAll('{reference}', 'abc-2026-0001')).success
  ) {
    return invalid('replyAddress', 'must be an e-mail address; {reference} may stand before the @');
  }
  await inTransaction(async (transaction) => {
    await writeAnsweringSettings(networkId, settings, userId, transaction);
    const detail = { needsApproval: settings.needsApproval, replyAddress: address };
    await appendAudit(
      { userId, networkId, action: 'answering-settings.change', subject: 'answering', detail },
      transaction,
    );
  });
  return done(null);
}
