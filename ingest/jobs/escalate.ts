import { escalate } from '#ingest/notify/escalate';

/** Tells the next people of what nobody has acknowledged; nothing is left to do at once, whatever it found. */
export async function escalateUnacknowledged(now: Date): Promise<number> {
  await escalate(now);
  return 0;
}
