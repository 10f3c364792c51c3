import { randomBytes } from 'node:crypto';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { countWaiting } from '#lib/services/networks/waiting';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const base = '/api/v1/networks/merrow';
let networkId: number;
let session: string;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  session = (await makePerson(networkId, ['operator'])).session;
  const stations = [
    await makeStation(networkId, 'MER-01'),
    await makeStation(await makeNetwork('far'), 'F-1'),
  ];
  for (const stationId of stations) {
    for (const settledAt of [null, null, new Date()]) {
      await db()('quarantine').insert({
        station_id: stationId,
        received_at: new Date(),
        code: 'malformed',
        detail: 'A test',
        record: '{}',
        record_digest: randomBytes(32),
        settled_at: settledAt,
      });
    }
  }
});

const post = async (path: string, body: object) => {
  const answer = await callApi('POST', `${base}/${path}`, { session, body });
  expect(answer.status, await answer.clone().text()).toBe(201);
  return (await answer.json()) as Record<string, { id: number }>;
};

test('operators are told of refused records and doubtful data that wait for them; others are not', async () => {
  const body = { serialNumber: 'A-1', class: 1, description: '', microphone: '' };
  const instrument = (await post('instruments', body))['instrument']?.id ?? 0;
  await post(`instruments/${instrument}/deployments`, { station: 'MER-01', from: '2026-01-01T00:00:00Z' });
  const check = { instrument, calibratorLevel: 94, checkedBy: 'A. Field' };
  await post('calibrations', { ...check, checkedAt: '2026-02-01T09:00:00Z', before: 94 });
  await post('calibrations', { ...check, checkedAt: '2026-03-01T09:00:00Z', before: 96, after: 94 });
  expect(await countWaiting(networkId, true)).toEqual({
    exceedances: 0,
    complaints: 0,
    quarantine: 2,
    instruments: 1,
  });
  expect(await countWaiting(networkId, false)).toMatchObject({ quarantine: 0, instruments: 0 });
});
