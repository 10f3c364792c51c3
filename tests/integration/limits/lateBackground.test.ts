import { expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { judged, minutesAt, send } from './support';

useFreshSchema();

const NIGHT_SEC = Date.parse('2026-03-02T23:00:00Z') / 1000;
const NOON_SEC = Date.parse('2026-03-03T12:00:00Z') / 1000;

test('late data of the hours of the background have the windows judged that look back at them', async () => {
  const networkId = await makeNetwork('late-background');
  const stationId = await makeStation(networkId, 'LB-1');
  const { session } = await makePerson(networkId, ['operator']);
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
  await send(stationId, NOON_SEC, minutesAt(60, 60));
  await judged();
  expect(await db()('exceedances')).toEqual([]);
  await send(stationId, NIGHT_SEC, minutesAt(40, 360));
  await judged();
  expect(await db()('exceedances').select('starts_at', 'level_db', 'state')).toEqual([
    { starts_at: NOON_SEC, level_db: 20, state: 'standing' },
  ]);
});
