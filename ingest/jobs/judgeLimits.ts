import type { Buckets } from '#db/queries/onlyBuckets';
import { judgeDueWindows, type TellChanges } from '#ingest/detect/judge';
import { queueWebhooks } from '#ingest/notify/queueWebhooks';
import { tellExceedances } from '#ingest/notify/tellExceedances';

/** People by e-mail, machines by webhook. */
const tellEverybody: TellChanges = async (changes, now, transaction) => {
  await tellExceedances(changes, now, transaction);
  await queueWebhooks(changes, now, transaction);
};

/** Judges windows that have closed. @returns how many. */
export function judgeLimits(now: Date, buckets: Buckets = null): Promise<number> {
  return judgeDueWindows(now, tellEverybody, buckets);
}
