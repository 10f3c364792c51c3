import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { listLimitVersions } from '#db/queries/limits';
import { judgedWindows } from '#lib/services/limits/force';
import { listSettings } from '#db/queries/networks';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const PATH = '/api/v1/networks/grouped/station-groups';
const LIMITS = '/api/v1/networks/grouped/limits';
const LIMIT = { name: 'Quay', metric: 'LAeq', window: '15min', threshold: 60 };
let networkId: number;
let stationIds: number[];
let operator: string;
let regulator: string;

beforeAll(async () => {
  networkId = await makeNetwork('grouped');
  stationIds = [await makeStation(networkId, 'GR-1'), await makeStation(networkId, 'GR-2')];
  await makeStation(await makeNetwork('elsewhere'), 'EL-1');
  ({ session: operator } = await makePerson(networkId, ['operator']));
  ({ session: regulator } = await makePerson(networkId, ['regulator']));
});

async function call(method: string, path: string, body?: object, session = operator) {
  const response = await callApi(method, path, { session, body });
  const text = await response.text();
  return { status: response.status, body: (text === '' ? null : JSON.parse(text)) as never };
}

async function makeGroup(name: string, stations: string[]): Promise<number> {
  const made = await call('POST', PATH, { name, stations });
  expect(made.status).toBe(201);
  return (made.body as { group: { id: number } }).group.id;
}

test('a limit on a group holds for its stations at the time: a change is a version, past windows keep theirs', async () => {
  const group = await makeGroup('Quay side', ['GR-1']);
  const set = await call('POST', LIMITS, { ...LIMIT, group, effectiveFrom: new Date(Date.now() - 864e5) });
  expect(set.body).toMatchObject({ limit: { group, groupName: 'Quay side', stations: ['GR-1'] } });
  const { id } = (set.body as { limit: { id: number } }).limit;
  const laterSec = Math.floor(Date.now() / 1000) + 86_400;
  const later = {
    ...LIMIT,
    name: 'Later',
    group,
    reason: 'New permit',
    effectiveFrom: new Date(laterSec * 1000),
  };
  expect((await call('POST', `${LIMITS}/${id}/versions`, later)).status).toBe(201);

  const changed = await call('PUT', `${PATH}/${group}`, { name: 'Quay side', stations: ['GR-2'] });
  expect(changed.status).toBe(200);
  expect(changed.body).toMatchObject({ group: { stations: ['GR-2'], limits: [{ id }] } });

  const versions = (await listLimitVersions(networkId)).filter(({ limitId }) => limitId === id);
  expect(versions.map(({ version, name, stationIds: ids }) => [version, name, ids])).toEqual([
    [1, 'Quay', [stationIds[0]]],
    [2, 'Later', [stationIds[0]]],
    [3, 'Quay', [stationIds[1]]],
    [4, 'Later', [stationIds[1]]],
  ]);
  expect(versions.at(-1)?.effectiveFromSec).toBe(laterSec);
  const timeline = await listSettings(networkId);
  const countOf = (stationId: number | undefined, fromSec: number) =>
    judgedWindows(versions, stationId ?? 0, { fromSec, toSec: fromSec + 3600 }, timeline).length;
  const [pastSec, soonSec] = [laterSec - 2 * 86_400 + 3600, laterSec - 7200];
  expect([countOf(stationIds[0], pastSec), countOf(stationIds[1], pastSec)]).toEqual([4, 0]);
  for (const fromSec of [soonSec, laterSec + 3600])
    expect([countOf(stationIds[0], fromSec), countOf(stationIds[1], fromSec)]).toEqual([0, 4]);
  const acts = await db()('audit_log').where({ network_id: networkId, action: 'station-group.change' });
  expect(acts).toHaveLength(1);

  expect((await call('DELETE', `${PATH}/${group}`)).status).toBe(409);
  const renamed = await call('PUT', `${PATH}/${group}`, { name: 'Quay', stations: ['GR-2'] });
  expect(renamed.status).toBe(200);
  expect((await call('GET', `${LIMITS}/${id}`)).body).toMatchObject({ limit: { groupName: 'Quay' } });
  expect((await listLimitVersions(networkId)).filter(({ limitId }) => limitId === id)).toHaveLength(4);
});

test('a limit that has left the group is not changed with it', async () => {
  const group = await makeGroup('Gate', ['GR-1']);
  const set = await call('POST', LIMITS, { ...LIMIT, group });
  const { id } = (set.body as { limit: { id: number } }).limit;
  expect((await call('POST', `${LIMITS}/${id}/versions`, { ...LIMIT, reason: 'Everywhere' })).status).toBe(
    201,
  );
  expect((await call('PUT', `${PATH}/${group}`, { name: 'Gate', stations: ['GR-2'] })).body).toMatchObject({
    group: { limits: [] },
  });
  expect((await call('GET', `${LIMITS}/${id}`)).body).toMatchObject({
    limit: { version: 2, stations: null },
  });
});

test('what does not fit is refused in clear words; others read, foreign groups are not there', async () => {
  const group = await makeGroup('Only', ['GR-1']);
  const refused: [method: string, path: string, body: object, status: number, field?: string][] = [
    ['POST', PATH, { name: 'Only', stations: ['GR-1'] }, 422, 'name'],
    ['POST', PATH, { name: 'Nobody', stations: [] }, 422, 'stations'],
    ['POST', PATH, { name: 'Foreign', stations: ['EL-1'] }, 422, 'stations'],
    ['PUT', `${PATH}/999999`, { name: 'None', stations: ['GR-1'] }, 404],
    ['POST', LIMITS, { ...LIMIT, group: 999_999 }, 422, 'group'],
    ['POST', LIMITS, { ...LIMIT, group, stations: ['GR-1'] }, 422, 'stations'],
  ];
  for (const [method, path, body, status, field] of refused) {
    const answer = await call(method, path, body);
    expect(answer.status, JSON.stringify(body)).toBe(status);
    if (field) expect(JSON.stringify(answer.body)).toContain(`"field":"${field}"`);
  }
  expect((await call('POST', PATH, { name: 'Mine', stations: ['GR-1'] }, regulator)).status).toBe(403);
  expect((await call('GET', PATH, undefined, regulator)).body).toMatchObject({ next: null });
  expect((await call('DELETE', `${PATH}/${group}`)).status).toBe(204);
  const trial = {
    from: '2026-03-01',
    to: '2026-03-02',
    limit: { ...LIMIT, group: await makeGroup('Tried', ['GR-2']) },
  };
  expect((await call('POST', `${LIMITS}/trial`, trial)).body).toMatchObject({
    trial: { stations: [{ code: 'GR-2' }] },
  });
});
