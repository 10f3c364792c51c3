import { expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { aggregate } from '#ingest/jobs/aggregate';
import { makeStation } from '../../integration/support/people';
import { PostingStation } from './postingStation';

/** What has to hold of locks and deadlocks, wherever the tables are. */
export function testLocks(posting: () => PostingStation): void {
  test('a lock that is held: posts of other stations go on, and the one that waits is taken once it is free', async () => {
    const station = posting();
    const other = await otherStation();
    const holder = await db().transaction();
    await holder('station_locks').where({ station_id: station.stationId }).forUpdate().first();
    let isTaken = false;
    const waiting = station.postUntilTaken(station.nextBatch(1)).then(() => (isTaken = true));
    for (let round = 0; round < 3; round += 1) expect(await other.post(other.nextBatch(1))).toBe(true);
    expect(isTaken).toBe(false);
    await holder.rollback();
    await waiting;
    await station.expectNothingLost();
    await other.expectNothingLost();
  });

  test('deadlocks: aggregation and posts for the same station end with everything computed', async () => {
    const station = posting();
    const posts = Promise.all(Array.from({ length: 6 }, () => station.postUntilTaken(station.nextBatch(30))));
    const rounds = Promise.all(
      Array.from({ length: 3 }, async () => {
        for (let round = 0; round < 2; round += 1) await aggregate().catch(() => 0);
      }),
    );
    await Promise.all([posts, rounds]);
    await station.expectNothingLost();
    for (let round = 0; round < 40 && (await aggregate()) > 0; round += 1);
    expect(await db()('dirty_marks').first('id')).toBeUndefined();
  });
}

async function otherStation(): Promise<PostingStation> {
  const networkId = (await db()('networks').first('id')).id as number;
  const stationId = await makeStation(networkId, 'QY-2');
  return new PostingStation(
    stationId,
    await inTransaction((transaction) => insertStationToken(stationId, null, transaction)),
  );
}
