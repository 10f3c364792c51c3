import { countMails } from '#db/queries/outboxState';
import { listWebhooks } from '#db/queries/webhooks';

/** What did not get through and waits for a person: messages that were given up, and webhooks that fail. */
export interface AlertFailures {
  mails: number;
  webhooks: number;
}

export async function alertFailures(networkId: number): Promise<AlertFailures> {
  const [counts, webhooks] = await Promise.all([countMails(networkId, new Date()), listWebhooks(networkId)]);
  const failing = webhooks.filter(
    ({ failingSince, disabledAt }) => failingSince !== null || disabledAt !== null,
  );
  return { mails: counts.dead, webhooks: failing.length };
}
