import { randomBytes, randomUUID } from 'node:crypto';
import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { insertDeliveries, listDeliveries, type DeliveryRow } from '#db/queries/webhookDeliveries';
import {
  endWebhook,
  findWebhook,
  insertWebhook,
  listWebhooks,
  lockWebhook,
  updateWebhookHealth,
  type WebhookRow,
} from '#db/queries/webhooks';
import { config } from '#lib/config/index';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { webhookSecret } from './signature';
import { targetProblem } from './target';

interface Actor {
  networkId: number;
  userId: string;
}

const MOST_WEBHOOKS = 10;
const SHOWN_DELIVERIES = 50;
const NONE = 'There is no such webhook here: it was ended meanwhile.';

/** A network's webhooks, and what was posted to them last. */
export async function webhooksOf(
  networkId: number,
): Promise<{ webhooks: WebhookRow[]; deliveries: DeliveryRow[] }> {
  const [webhooks, deliveries] = await Promise.all([
    listWebhooks(networkId),
    listDeliveries(networkId, SHOWN_DELIVERIES),
  ]);
  return { webhooks, deliveries };
}

/** A webhook with the secret that its receiver checks signatures with. */
export interface AddedWebhook {
  webhook: WebhookRow;
  secret: string;
}

/** Adds a webhook and answers it with its secret, told this once. */
export function addWebhook(actor: Actor, url: string): Promise<Outcome<AddedWebhook>> {
  return inTransaction(async (transaction) => {
    const problem = url.length > 500 ? 'must have at most 500 characters' : targetProblem(url, mayLoopBack());
    if (problem) return invalid('url', problem);
    const known = await listWebhooks(actor.networkId, transaction);
    if (known.some((webhook) => webhook.url === url))
      return invalid('url', 'is a webhook of this network already');
    if (known.length >= MOST_WEBHOOKS) {
      return invalid('url', `is one too many: a network has at most ${MOST_WEBHOOKS} webhooks`);
    }
    const salt = randomBytes(16);
    const id = await insertWebhook(
      { networkId: actor.networkId, url, salt, createdBy: actor.userId },
      transaction,
    );
    await note(actor, 'webhook.add', { id, url }, transaction);
    const webhook = await findWebhook(id, transaction);
    if (!webhook) throw new Error(`There is no webhook ${id}.`);
    return done({ webhook, secret: webhookSecret(salt) });
  });
}

/** Ends a webhook for good; what waits for it is not posted. */
export function removeWebhook(actor: Actor, id: number): Promise<Outcome<null>> {
  return onWebhook(actor, id, async ({ url }, transaction) => {
    await endWebhook(id, transaction);
    await note(actor, 'webhook.end', { id, url }, transaction);
  });
}

/** Has a webhook tried again at once, also one that was given up. */
export function retryWebhook(actor: Actor, id: number): Promise<Outcome<null>> {
  return onWebhook(actor, id, async ({ url }, transaction) => {
    const fresh = { failures: 0, failingSince: null, disabledAt: null, disabledReason: null };
    await updateWebhookHealth(id, { ...fresh, nextAttemptAt: new Date() }, transaction);
    await note(actor, 'webhook.retry', { id, url }, transaction);
  });
}

/** Has an event posted that says nothing but that it is a test. */
export function testWebhook(actor: Actor, id: number): Promise<Outcome<null>> {
  return onWebhook(actor, id, async (_, transaction) => {
    const eventId = randomUUID();
    const body = JSON.stringify({ id: eventId, event: 'test', at: new Date().toISOString() });
    await insertDeliveries(
      [{ webhookId: id, eventId, event: 'test', key: `test/${eventId}`, body }],
      transaction,
    );
  });
}

function onWebhook(
  { networkId }: Actor,
  id: number,
  act: (webhook: WebhookRow, transaction: Connection) => Promise<void>,
): Promise<Outcome<null>> {
  return inTransaction(async (transaction) => {
    const webhook = await lockWebhook(id, transaction);
    if (webhook?.networkId !== networkId) return unknown(NONE);
    await act(webhook, transaction);
    return done(null);
  });
}

/** Whether webhooks may lead to this machine, by the settings. */
function mayLoopBack(): boolean {
  return config().webhooksMayLoopBack;
}

function note(
  { networkId, userId }: Actor,
  action: string,
  detail: { id: number; url: string },
  transaction: Connection,
): Promise<void> {
  return appendAudit(
    { userId, networkId, action, subject: `webhook ${detail.id}`, detail: { url: detail.url } },
    transaction,
  );
}
