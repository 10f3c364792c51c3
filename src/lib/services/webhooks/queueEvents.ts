import { randomUUID } from 'node:crypto';
import type { Connection } from '#db/queries/connection';
import { findExceedance } from '#db/queries/exceedances';
import { findNetworkById } from '#db/queries/networks';
import { insertDeliveries, type NewDelivery } from '#db/queries/webhookDeliveries';
import { listWebhooks } from '#db/queries/webhooks';
import { exceedanceView } from '../exceedances/view';

/** Something that happened to an exceedance. */
export interface ExceedanceEvent {
  exceedanceId: number;
  kind: 'found' | 'changed' | 'lifted' | 'again' | 'acknowledged';
  /** Names what happened: posted once a webhook. */
  key: string;
}

/** Notes for each webhook of a network what is to be posted, in the transaction of what happened. */
export async function queueEvents(
  networkId: number,
  events: readonly ExceedanceEvent[],
  now: Date,
  transaction: Connection,
): Promise<void> {
  const webhooks = await listWebhooks(networkId, transaction);
  const network = webhooks.length > 0 && (await findNetworkById(networkId, transaction));
  if (!network) return;
  const bodies: Omit<NewDelivery, 'webhookId'>[] = [];
  for (const { exceedanceId, kind, key } of events) {
    const row = await findExceedance(networkId, exceedanceId, transaction);
    if (!row) continue;
    // Who acknowledged it and what was noted stays inside.
    const { acknowledgement, ...exceedance } = exceedanceView(row);
    const told = {
      id: randomUUID(),
      event: `exceedance.${kind}`,
      at: now.toISOString(),
      network: network.slug,
    };
    const body = { ...told, exceedance: { ...exceedance, isAcknowledged: acknowledgement !== null } };
    bodies.push({ eventId: told.id, event: told.event, key, body: JSON.stringify(body) });
  }
  const deliveries = webhooks.flatMap(({ id }) => bodies.map((body) => ({ ...body, webhookId: id })));
  await insertDeliveries(deliveries, transaction);
}
