import type { Buckets } from '#db/queries/onlyBuckets';
import { makeTraces } from '#ingest/traces/makeTraces';

/** Makes the traces of days that wait for them. @returns how many. */
export async function traceDays(now: Date, buckets: Buckets = null): Promise<number> {
  return makeTraces(now, { buckets });
}
