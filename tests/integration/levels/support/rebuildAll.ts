import { aggregateAll, type OnQuartersRecomputed } from '#ingest/aggregate/aggregate';
import { dropComputed } from '#ingest/aggregate/rebuild';

/** Drops what is computed and computes it again, as `ops/rebuild.ts` and the worker do one after the other. */
export async function rebuildAll(onQuartersRecomputed: OnQuartersRecomputed): Promise<void> {
  await dropComputed();
  await aggregateAll(onQuartersRecomputed);
}
