import { createHash } from 'node:crypto';
import { BUCKETS } from '#db/sharding/kinds';

/**
 * Buckets of stations that fall to one of some workers, by rendezvous hashing: each bucket goes to the worker whose digest together with it is
 * highest, so that workers who know the same of each other agree without a word, and only a dead worker's buckets move.
 * @param workerIds all that live, the worker among them.
 */
export function bucketsOfWorker(id: string, workerIds: readonly string[]): number[] {
  return Array.from({ length: BUCKETS }, (_, bucket) => bucket).filter(
    (bucket) => highest(bucket, workerIds) === id,
  );
}

function highest(bucket: number, workerIds: readonly string[]): string | undefined {
  const weighed = workerIds.map((id) => ({ id, weight: weightOf(bucket, id) }));
  return weighed.sort((a, b) => (a.weight < b.weight ? 1 : -1))[0]?.id;
}

function weightOf(bucket: number, id: string): string {
  return createHash('sha256').update(`${bucket} ${id}`).digest('hex');
}
