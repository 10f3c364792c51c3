import { expect, test } from 'vitest';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { judgeDueWindows } from '#ingest/detect/judge';
import { receiveBatch } from '#ingest/receive/receive';
import { db } from '#db/client';
import { pendWindowsFor } from '#ingest/detect/pendWindows';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const NIGHT_SEC = Date.parse('2026-03-02T23:00:00Z') / 1000;
const NOON_SEC = Date.parse('2026-03-03T12:00:00Z') / 1000;

test('late data of the hours of the background have the windows judged that look back at them', async () => {
  const networkId = await makeNetwork('late-background');
  const stationId = await makeStation(networkId, 'LB-1');
  const { session } = await makePerson(networkId, ['operator']);
  const send = async (fromSec: number, minutes: number, LAeq: number) => {
    const intervals = Array.from({ length: minutes }, (_, minute) => {
      const start = new Date((fromSec + minute * 60) * 1000).toISOString();
      return { start, seconds: 60, LAeq, levels: [LAeq] };
    });
    const envelope = { bands: [100], bandIndices: { indices: [-10] }, intervals };
    await receiveBatch({ id: stationId, bandFraction: 3, acceptsFromSec: null }, envelope, new Date());
    await aggregateAll(pendWindowsFor);
    while ((await judgeDueWindows(new Date(), async () => undefined)) > 0);
  };
  const body = {
    name: 'Above the night',
    metric: 'LAeqLessLA90',
    window: '1h',
    backgroundFrom: '23:00',
    backgroundTo: '05:00',
    threshold: 15,
    effectiveFrom: '2026-03-01T00:00:00Z',
  };
  const set = await callApi('POST', '/api/v1/networks/late-background/limits', { session, body });
  expect(set.status).toBe(201);
  await send(NOON_SEC, 60, 60);
  expect(await db()('exceedances')).toEqual([]);
  await send(NIGHT_SEC, 360, 40);
  expect(await db()('exceedances').select('starts_at', 'level_db', 'state')).toEqual([
    { starts_at: NOON_SEC, level_db: 20, state: 'standing' },
  ]);
});
