import type { Buckets } from '#db/queries/onlyBuckets';
import { aggregateMarks } from '#ingest/aggregate/aggregate';
import { pendWindowsFor } from '#ingest/detect/pendWindows';

/** Recomputes what is marked, and has the windows judged that it is part of. @returns how many quarter-hours. */
export async function aggregate(buckets: Buckets = null): Promise<number> {
  const run = await aggregateMarks(pendWindowsFor, { buckets });
  return run.quarters;
}
