import type { FormValues } from '#lib/http/forms';
import { idOf, valueOf } from '#lib/http/outcome';
import { badRequest } from '#lib/http/problem';
import { addWebhook, removeWebhook, retryWebhook, testWebhook } from '#lib/services/webhooks/webhooks';

/** What each act of the page did, in words. */
export const WEBHOOK_DONE = {
  added: 'The webhook was added. Exceedances found from now on are posted to it.',
  ended: 'The webhook was ended: nothing is posted to it any more.',
  retried: 'It is tried again now.',
  tested: 'A test is posted within a few seconds; how it fared stands in the log below after reloading.',
} as const;

/**
 * Does what a form of the page asks.
 * @returns which of the acts was done, and the secret of a webhook just added, to be shown once.
 * @throws {Problem} with what is wrong, by field.
 */
export async function actOnWebhooks(
  { text }: FormValues,
  actor: { networkId: number; userId: string },
): Promise<{ done: keyof typeof WEBHOOK_DONE; secret: string | null }> {
  const id = idOf(text['webhook']);
  switch (text['act']) {
    case 'add':
      return { done: 'added', secret: valueOf(await addWebhook(actor, text['url'] ?? '')).secret };
    case 'end':
      valueOf(await removeWebhook(actor, id));
      return { done: 'ended', secret: null };
    case 'retry':
      valueOf(await retryWebhook(actor, id));
      return { done: 'retried', secret: null };
    case 'test':
      valueOf(await testWebhook(actor, id));
      return { done: 'tested', secret: null };
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}
