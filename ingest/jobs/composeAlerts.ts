import { composeDueAlerts } from '#ingest/notify/composeAlerts';

/** Puts what people wait for, digests and bursts, into the outbox. @returns how many messages. */
export function composeAlerts(now: Date): Promise<number> {
  return composeDueAlerts(now);
}
