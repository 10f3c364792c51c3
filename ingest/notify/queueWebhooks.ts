import { randomUUID } from 'node:crypto';
import type { Connection } from '#db/queries/connection';
import { findExceedance } from '#db/queries/exceedances';
import { findNetworkById } from '#db/queries/networks';
import { insertDeliveries, type NewDelivery } from '#db/queries/webhookDeliveries';
import { listWebhooks } from '#db/queries/webhooks';
import type { TellChanges, TellingChange } from '#ingest/detect/judge';
import { exceedanceView } from '#lib/services/exceedances/view';
import { groupBy } from '#lib/services/groupBy';
import { isWorthTelling, keyOf } from './tellExceedances';

/** Notes for each webhook of a network what is to be posted, in the transaction of the changes. */
export const queueWebhooks: TellChanges = async (changes, now, transaction) => {
  const recent = changes.filter((change) => isWorthTelling(change, now));
  for (const [networkId, ofNetwork] of groupBy(recent, ({ station }) => station.networkId)) {
    const webhooks = await listWebhooks(networkId, transaction);
    if (webhooks.length === 0) continue;
    const bodies = await bodiesOf(networkId, ofNetwork, now, transaction);
    const deliveries = webhooks.flatMap(({ id }) => bodies.map((body) => ({ ...body, webhookId: id })));
    await insertDeliveries(deliveries, transaction);
  }
};

async function bodiesOf(
  networkId: number,
  changes: readonly TellingChange[],
  now: Date,
  transaction: Connection,
): Promise<Omit<NewDelivery, 'webhookId'>[]> {
  const network = await findNetworkById(networkId, transaction);
  const bodies: Omit<NewDelivery, 'webhookId'>[] = [];
  for (const change of changes) {
    const row = await findExceedance(networkId, change.exceedanceId, transaction);
    if (!row || !network) continue;
    // Who acknowledged it and what was noted stays inside.
    const { acknowledgement, ...exceedance } = exceedanceView(row);
    const event = `exceedance.${change.kind}`;
    const eventId = randomUUID();
    const isAcknowledged = acknowledgement !== null;
    const told = { id: eventId, event, at: now.toISOString(), network: network.slug };
    const body = JSON.stringify({ ...told, exceedance: { ...exceedance, isAcknowledged } });
    bodies.push({ eventId, event, key: keyOf(change), body });
  }
  return bodies;
}
