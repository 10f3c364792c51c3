import type { DeliveryRow } from '#db/queries/webhookDeliveries';
import type { WebhookRow } from '#db/queries/webhooks';
import type { Webhook, WebhookDelivery } from '#lib/contracts/alertRoutes';

/** A webhook as the interface gives it: without its secret. */
export function webhookJson(row: WebhookRow): Webhook {
  const isFailing = row.failures > 0 && row.disabledAt === null;
  return {
    id: row.id,
    url: row.url,
    state: row.disabledAt ? 'given-up' : isFailing ? 'failing' : 'working',
    failures: row.failures,
    failingSince: row.failingSince?.toISOString() ?? null,
    nextAttemptAt: isFailing ? row.nextAttemptAt.toISOString() : null,
    problem: row.disabledReason,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdByName,
  };
}

/** What was posted, or waits to be. */
export function deliveryJson(row: DeliveryRow): WebhookDelivery {
  return {
    id: row.eventId,
    webhook: row.webhookId,
    event: row.event,
    state: row.state,
    attempts: row.attempts,
    outcome: row.lastOutcome,
    createdAt: row.createdAt.toISOString(),
    lastAttemptAt: row.lastAttemptAt?.toISOString() ?? null,
  };
}
