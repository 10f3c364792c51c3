import { db } from '#db/client';
import { dataServers } from '#db/sharding/dataServers';
import { definitionOf } from '#db/sharding/shardTables';
import { serversOfLinkTable } from '#db/sharding/texts';
import { groupBy } from '#lib/services/groupBy';

/** Some buckets, those of each data server by themselves, as the head has them; all of them together where tables are local. */
export async function bucketsByServer(buckets: readonly number[]): Promise<(readonly number[])[]> {
  if (dataServers().length === 0) return [buckets];
  const servers = serversOfLinkTable(await definitionOf(db(), 'dirty_marks'));
  return [...groupBy(buckets, (bucket) => servers[bucket]).values()];
}
