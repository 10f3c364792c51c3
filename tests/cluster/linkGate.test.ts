import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDb, db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { withGateClosed } from '#db/sharding/linkGate';
import { makeNetwork, makeStation } from '#ops/bench/support/station';
import { useFreshSchema } from '../integration/support/freshSchema';

/** Links that change while transactions commit which write to the head and to data servers. Without the gate a tenth of them lose the latter part, and are told that all is well. */
useFreshSchema();
const WRITERS = 6;
const ROUNDS = 25;
const QUARTER_SEC = 900;
const FIRST_SEC = 1_748_736_000;

const stationIds: number[] = [];
const told: string[] = [];
let isOver = false;

beforeAll(async () => {
  await db().raw(
    'CREATE TABLE of_head (station_id INT NOT NULL, at_sec INT NOT NULL, PRIMARY KEY (station_id, at_sec))',
  );
  const networkId = await makeNetwork();
  for (let at = 0; at < WRITERS; at += 1)
    stationIds.push((await makeStation(networkId, `GATE-${at}`, 60)).id);
});
afterAll(closeDb);

async function write(stationId: number): Promise<void> {
  for (let at = FIRST_SEC; !isOver; at += QUARTER_SEC) {
    await inTransaction(async (transaction) => {
      await transaction('dirty_marks').insert({ station_id: stationId, quarter_starts_at: at, marked_at: 1 });
      await transaction('of_head').insert({ station_id: stationId, at_sec: at });
    });
    told.push(`${stationId} ${at}`);
    await sleep(20 * Math.random());
  }
}

const keysOf = (rows: readonly { station_id: number; at: number }[]) =>
  new Set(rows.map(({ station_id, at }) => `${station_id} ${at}`));

test('what is told as committed is there, on the head and on data servers, however often links change', async () => {
  const writers = Promise.all(stationIds.map(write));
  for (let round = 0; round < ROUNDS; round += 1) {
    await withGateClosed(() =>
      db().raw('RENAME TABLE dirty_marks TO dirty_marks__aside, dirty_marks__aside TO dirty_marks'),
    );
    await sleep(100);
  }
  isOver = true;
  await writers;
  const marked = keysOf(await db()('dirty_marks').select('station_id', { at: 'quarter_starts_at' }));
  const ofHead = keysOf(await db()('of_head').select('station_id', { at: 'at_sec' }));
  expect(told.length).toBeGreaterThan(WRITERS * ROUNDS);
  expect(
    told.filter((key) => !marked.has(key)),
    'lost on data servers',
  ).toEqual([]);
  expect(ofHead).toEqual(marked);
});
