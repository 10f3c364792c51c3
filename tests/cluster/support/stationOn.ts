import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { bucketOf } from '#db/sharding/kinds';
import { placesOfBuckets } from '#ops/cluster/moveBucket';
import { PostingStation } from '../../faults/support/postingStation';
import { makeStation } from '../../integration/support/people';

/** A station that posts, and whose intervals are on a data server: the first that falls there. */
export async function stationOn(networkId: number, server: string): Promise<PostingStation> {
  const places = await placesOfBuckets();
  for (let at = 0; ; at += 1) {
    const stationId = await makeStation(networkId, `${server}-${at}`);
    if (places[bucketOf(stationId)]?.name !== server) continue;
    const token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
    return new PostingStation(stationId, token);
  }
}

/** How much of a station was computed, in seconds of valid intervals. */
export async function computedSec({ stationId }: PostingStation): Promise<number> {
  const [sums] = await db()('quarter_hours').where({ station_id: stationId }).sum({ validSec: 'valid_sec' });
  return Number((sums as { validSec: string | null } | undefined)?.validSec);
}
