import type { Knex } from 'knex';
import { dataServers } from '../sharding/dataServers';
import { BUCKETS, type Kind } from '../sharding/kinds';
import { linkPartition } from '../sharding/texts';
import type { Connection } from './connection';

/** Some buckets of stations (`bucketOf`), at least one; null: all of them. */
export type Buckets = readonly number[] | null;

/** Leaves rows of stations of some buckets: for `modify`. */
export function onlyBuckets(query: Knex.QueryBuilder, buckets: Buckets): void {
  if (buckets === null || buckets.length === BUCKETS) return;
  void query.whereRaw(`station_id MOD ${BUCKETS} IN (${buckets.map(() => '?').join(', ')})`, [...buckets]);
}

/** A high-volume table's rows of stations of some buckets; on a cluster only their servers are asked. */
export function inBuckets(table: Kind, buckets: Buckets, conn: Connection): Knex.QueryBuilder {
  if (buckets === null || dataServers().length === 0) return conn(table).modify(onlyBuckets, buckets);
  // By a condition alone the server leaves out no partition whose function is an expression.
  return conn(conn.raw(`?? PARTITION (${buckets.map(linkPartition).join(', ')})`, [table]));
}
