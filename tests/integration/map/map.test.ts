import { beforeAll, describe, expect, test } from 'vitest';
import { inTransaction } from '#db/queries/connection';
import { insertComplaint } from '#db/queries/complaints';
import type { MapLayers, NetworkLevels } from '#lib/contracts/networkMap';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { at, storeMinutes } from '../complaints/support';
import { makeExceedance, makeLimit } from '../exceedances/support';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const BASE = '/api/v1/networks/merrow';
const HOUR = 'from=2026-03-17T12:00:00Z&to=2026-03-17T13:00:00Z';
const FROM_SEC = at('2026-03-17T12:00:00Z');
let networkId: number;
let session: string;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  session = (await makePerson(networkId, ['regulator'])).session;
  const stationId = await makeStation(networkId, 'MER-01');
  await makeStation(networkId, 'MER-02');
  // Half the second quarter is missing.
  await storeMinutes(stationId, FROM_SEC, FROM_SEC + 1350, (sec) => ({
    laeqCentiDb: sec < FROM_SEC + 900 ? 5230 : 6000,
  }));
  const limit = await makeLimit(networkId, 'Hourly');
  await makeExceedance({ networkId, stationId, limit, startSec: FROM_SEC - 1800, levelDb: 57 });
  await makeExceedance({ networkId, stationId, limit, startSec: FROM_SEC - 86_400, levelDb: 57 });
});

async function ask<T>(path: string): Promise<T> {
  const answer = await callApi('GET', `${BASE}/${path}`, { session });
  expect(answer.status).toBe(200);
  return (await answer.json()) as T;
}

describe('levels of the network quarter by quarter', () => {
  const expected = {
    from: '2026-03-17T12:00:00Z',
    to: '2026-03-17T13:00:00Z',
    stepSeconds: 900,
    minimumCoverage: 0.75,
    stations: [
      {
        station: 'MER-01',
        LAeq: [52.3, 60, null, null],
        validSeconds: [900, 480, 0, 0],
        exceeded: [{ from: '2026-03-17T11:30:00Z', to: '2026-03-17T12:30:00Z' }],
      },
      { station: 'MER-02', LAeq: [null, null, null, null], validSeconds: [0, 0, 0, 0], exceeded: [] },
    ],
  };

  test('are the same before and after they have been computed', async () => {
    expect(await ask<NetworkLevels>(`levels?${HOUR}`)).toEqual(expected);
    await aggregateAll(async () => undefined);
    expect(await ask<NetworkLevels>(`levels?${HOUR}`)).toEqual(expected);
  });

  test('are of at most 26 hours', async () => {
    const days = 'from=2026-03-17T00:00:00Z&to=2026-03-19T00:00:00Z';
    expect((await callApi('GET', `${BASE}/levels?${days}`, { session })).status).toBe(400);
  });
});

test('layers count the standing exceedances that overlap the period, and tell rounded places only', async () => {
  const complaint = {
    networkId,
    startsAtSec: FROM_SEC,
    endsAtSec: FROM_SEC + 600,
    kind: 'hum' as const,
    nearestStationId: null,
    area: null,
    source: 'desk' as const,
    dueOn: '2026-03-31',
    createdBy: null,
  };
  const place = { coarseLatitude: 54.12, coarseLongitude: 1.63 };
  const nowhere = { coarseLatitude: null, coarseLongitude: null };
  await inTransaction(async (transaction) => {
    await insertComplaint({ ...complaint, ...place, reference: 'M-2026-0001' }, transaction);
    await insertComplaint({ ...complaint, ...place, reference: 'M-2026-0002' }, transaction);
    await insertComplaint({ ...complaint, ...nowhere, reference: 'M-2026-0003' }, transaction);
  });
  const layers = await ask<MapLayers>(`map-layers?${HOUR}`);
  expect(layers.exceedances).toEqual([{ station: 'MER-01', count: 1 }]);
  expect(layers.complaints).toEqual({
    places: [{ latitude: 54.12, longitude: 1.63, references: ['M-2026-0001', 'M-2026-0002'] }],
    withoutPlace: ['M-2026-0003'],
    isComplete: true,
  });
});

test.each(['levels', 'map-layers', 'wind'])(
  '%s are not there for people of another network',
  async (path) => {
    const stranger = (await makePerson(await makeNetwork(`far-${path}`), ['operator'])).session;
    expect((await callApi('GET', `${BASE}/${path}?${HOUR}`, { session: stranger })).status).toBe(404);
    expect((await callApi('GET', `${BASE}/${path}?${HOUR}`)).status).toBe(401);
  },
);
