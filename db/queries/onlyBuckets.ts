import type { Knex } from 'knex';
import { BUCKETS } from '../sharding/kinds';

/** Some buckets of stations (`bucketOf`), at least one; null: all of them. */
export type Buckets = readonly number[] | null;

/** Leaves rows of stations of some buckets: for `modify`. */
export function onlyBuckets(query: Knex.QueryBuilder, buckets: Buckets): void {
  if (buckets === null || buckets.length === BUCKETS) return;
  void query.whereRaw(`station_id MOD ${BUCKETS} IN (${buckets.map(() => '?').join(', ')})`, [...buckets]);
}
