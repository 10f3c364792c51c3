import { afterAll, beforeAll } from 'vitest';
import { closeDb } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { testLocks } from '../faults/support/lockTests';
import { PostingStation } from '../faults/support/postingStation';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makeNetwork, makeStation } from '../integration/support/people';

/** Locks and deadlocks of tables on data servers, which wait for each other through the head. */
useFreshSchema();
afterAll(closeDb);
let posting: PostingStation;

beforeAll(async () => {
  const stationId = await makeStation(await makeNetwork('quay'), 'QY-1');
  posting = new PostingStation(
    stationId,
    await inTransaction((transaction) => insertStationToken(stationId, null, transaction)),
  );
});

testLocks(() => posting);
