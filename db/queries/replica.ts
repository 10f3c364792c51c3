import { replicaDb } from '../client';
import { readingFrom } from './connection';

/** How far a replica has come. */
export interface ReplicaState {
  /** It has everything that was committed before: when it last heard that a worker lives. */
  asOfSec: number;
  /** How long ago that was. */
  ageSec: number;
}

/** Asks the replica how far it has come; null where there is none, or no worker has told it that it lives. */
export async function replicaState(): Promise<ReplicaState | null> {
  const replica = replicaDb();
  if (!replica) return null;
  // A worker that was seen by a clock far ahead says nothing.
  const row: { asOfSec: number | null; ageSec: number } | undefined = await replica('workers')
    .whereRaw('seen_at <= UNIX_TIMESTAMP() + 30')
    .first(
      replica.raw('MAX(seen_at) AS asOfSec'),
      replica.raw('GREATEST(0, CAST(UNIX_TIMESTAMP() AS SIGNED) - CAST(MAX(seen_at) AS SIGNED)) AS ageSec'),
    );
  return row && row.asOfSec !== null ? { asOfSec: row.asOfSec, ageSec: row.ageSec } : null;
}

/** Runs `work`, which only reads, with the replica in place of the database. */
export function onReplica<T>(work: () => Promise<T>): Promise<T> {
  const replica = replicaDb();
  return replica ? readingFrom(replica, work) : work();
}
