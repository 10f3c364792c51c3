import { makeTraces } from '#ingest/traces/makeTraces';

/** Makes the traces of days that wait for them. @returns how many. */
export async function traceDays(now: Date): Promise<number> {
  return makeTraces(now);
}
