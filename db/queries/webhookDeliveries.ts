import { inTransaction, pool, type Connection } from './connection';

export interface NewDelivery {
  webhookId: number;
  eventId: string;
  event: string;
  /** One delivery a webhook and cause: a second one with the same key is not added. */
  key: string;
  body: string;
}

/** A delivery that this sender holds until its lease ends. */
export interface LeasedDelivery extends Pick<NewDelivery, 'webhookId' | 'body'> {
  id: number;
  attempts: number;
  createdAt: Date;
}

/** A delivery as the log shows it. */
export interface DeliveryRow {
  id: number;
  webhookId: number;
  url: string;
  eventId: string;
  event: string;
  state: 'waiting' | 'delivered' | 'dead';
  attempts: number;
  lastOutcome: string | null;
  createdAt: Date;
  lastAttemptAt: Date | null;
}

export async function insertDeliveries(
  deliveries: readonly NewDelivery[],
  transaction: Connection,
): Promise<void> {
  if (deliveries.length === 0) return;
  const now = new Date();
  await transaction('webhook_deliveries')
    .insert(
      deliveries.map(({ webhookId, eventId, event, key, body }) => ({
        webhook_id: webhookId,
        event_id: eventId,
        event,
        event_key: key,
        body,
        created_at: now,
      })),
    )
    .onConflict(['webhook_id', 'event_key'])
    .merge({ event_key: transaction.raw('event_key') });
}

/** Nothing waits or is held longer: what would, was put off by a clock that was ahead. Far more than senders' clocks differ by. */
const LONGEST_WAIT_MS = 2 * 3_600_000;

/**
 * Takes the oldest delivery whose webhook is to be tried and that nobody holds, for `leaseSec` seconds. Times that lie further ahead than
 * any wait or lease count as past.
 */
export async function leaseDueDelivery(
  holder: string,
  now: Date,
  leaseSec: number,
): Promise<LeasedDelivery | undefined> {
  return inTransaction(
    async (transaction) => {
      const due = transaction('webhooks')
        .whereNull('ended_at')
        .whereNull('disabled_at')
        .where((query) =>
          query
            .where('next_attempt_at', '<=', now)
            .orWhere('next_attempt_at', '>', new Date(now.getTime() + LONGEST_WAIT_MS)),
        )
        .select('id');
      const delivery: LeasedDelivery | undefined = await transaction('webhook_deliveries')
        .where({ state: 'waiting' })
        .whereIn('webhook_id', due)
        .where((query) =>
          query
            .whereNull('leased_until')
            .orWhere('leased_until', '<', now)
            .orWhere('leased_until', '>', new Date(now.getTime() + LONGEST_WAIT_MS)),
        )
        .orderBy('id')
        .forUpdate()
        .skipLocked()
        .first({
          id: 'id',
          webhookId: 'webhook_id',
          body: 'body',
          attempts: 'attempts',
          createdAt: 'created_at',
        });
      if (!delivery) return undefined;
      await transaction('webhook_deliveries')
        .where({ id: delivery.id })
        .update({ leased_until: new Date(now.getTime() + leaseSec * 1000), lease_holder: holder });
      return delivery;
    },
    { isolationLevel: 'read committed' },
  );
}

/** Notes an attempt's outcome; answers false when another sender holds the delivery by now. */
export async function settleDelivery(
  { id, holder }: { id: number; holder: string },
  { state, outcome, at }: { state: DeliveryRow['state']; outcome: string; at: Date },
  transaction: Connection,
): Promise<boolean> {
  const changed = await transaction('webhook_deliveries')
    .where({ id, lease_holder: holder, state: 'waiting' })
    .update({
      state,
      leased_until: null,
      lease_holder: null,
      attempts: transaction.raw('attempts + 1'),
      last_outcome: outcome.slice(0, 300),
      last_attempt_at: at,
    });
  return changed > 0;
}

/** Deliveries of a network's webhooks that were not ended, latest first. */
export async function listDeliveries(
  networkId: number,
  limit: number,
  conn: Connection = pool(),
): Promise<DeliveryRow[]> {
  return conn('webhook_deliveries as d')
    .join('webhooks as w', 'w.id', 'd.webhook_id')
    .where({ 'w.network_id': networkId, 'w.ended_at': null })
    .orderBy('d.id', 'desc')
    .limit(limit)
    .select({
      id: 'd.id',
      webhookId: 'd.webhook_id',
      url: 'w.url',
      eventId: 'd.event_id',
      event: 'd.event',
      state: 'd.state',
      attempts: 'd.attempts',
      lastOutcome: 'd.last_outcome',
      createdAt: 'd.created_at',
      lastAttemptAt: 'd.last_attempt_at',
    });
}

/** Removes what was written before an instant. */
export async function deleteDeliveriesBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('webhook_deliveries').where('created_at', '<', before).delete();
}
