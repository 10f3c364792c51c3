import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { selectStaysAt } from '#db/queries/deployments';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const base = '/api/v1/networks/reeds/instruments';
const at = (instant: string) => Date.parse(instant) / 1000;
let operator: { session: string };
let regulator: { session: string };
let stationIds: number[];

beforeAll(async () => {
  const home = await makeNetwork('reeds');
  stationIds = [await makeStation(home, 'RD-1'), await makeStation(home, 'RD-2')];
  operator = { session: (await makePerson(home, ['operator'])).session };
  regulator = { session: (await makePerson(home, ['regulator'])).session };
});

let serial = 100;
async function addInstrument(): Promise<number> {
  serial += 1;
  const body = { serialNumber: String(serial), class: 1 };
  const response = await callApi('POST', base, { ...operator, body });
  expect(response.status).toBe(201);
  return (await response.json()).instrument.id;
}

function deploy(id: number, station: string, from: string, to: string | null = null) {
  return callApi('POST', `${base}/${id}/deployments`, { ...operator, body: { station, from, to } });
}

const problemsOf = async (response: Response) =>
  ((await response.json()) as { fields: { field: string; message: string }[] }).fields;

describe('instruments', () => {
  test('a serial number belongs to one instrument of a network', async () => {
    const body = {
      serialNumber: 'A-7',
      class: 2,
      description: 'logging meter',
      microphone: 'half-inch 20417',
    };
    expect((await callApi('POST', base, { ...operator, body })).status).toBe(201);
    const again = await callApi('POST', base, { ...operator, body });
    expect(again.status).toBe(422);
    expect(await problemsOf(again)).toEqual([
      { field: 'serialNumber', message: 'belongs to another instrument of this network' },
    ]);
  });

  test('the regulator reads them and changes nothing', async () => {
    const id = await addInstrument();
    expect((await callApi('GET', `${base}/${id}`, regulator)).status).toBe(200);
    const attempts: [string, string, Record<string, unknown>][] = [
      ['POST', base, { serialNumber: 'X', class: 1 }],
      ['PATCH', `${base}/${id}`, { class: 2 }],
      ['POST', `${base}/${id}/deployments`, { station: 'RD-1', from: '2026-01-01T00:00:00Z' }],
      ['POST', `${base}/${id}/deployments/1/end`, { to: '2026-01-01T00:00:00Z' }],
      ['POST', `${base}/${id}/deployments/1/withdrawal`, { reason: 'no' }],
    ];
    for (const [method, path, body] of attempts) {
      expect((await callApi(method, path, { ...regulator, body })).status, path).toBe(403);
    }
  });

  test('a change notes what was before, and retiring waits until it stands nowhere', async () => {
    const id = await addInstrument();
    const changed = await callApi('PATCH', `${base}/${id}`, { ...operator, body: { class: 2 } });
    expect((await changed.json()).instrument.class).toBe(2);
    const [entry] = await db()('audit_log').where({ action: 'instrument.change' }).orderBy('id', 'desc');
    expect(entry.detail).toEqual({ before: { class: 1 }, after: { class: 2 } });
    expect((await deploy(id, 'RD-1', '2020-01-01T00:00:00Z')).status).toBe(201);
    const body = { retired: true, reason: 'worn' };
    const refused = await callApi('PATCH', `${base}/${id}`, { ...operator, body });
    expect(await problemsOf(refused)).toMatchObject([{ field: 'retired' }]);
    const { deployments } = await (await callApi('GET', `${base}/${id}`, operator)).json();
    const path = `${base}/${id}/deployments/${deployments[0].id}/end`;
    await callApi('POST', path, { ...operator, body: { to: '2020-02-01T00:00:00Z' } });
    expect((await callApi('PATCH', `${base}/${id}`, { ...operator, body })).status).toBe(200);
    const refusedStay = await deploy(id, 'RD-1', '2020-03-01T00:00:00Z');
    expect(refusedStay.status).toBe(422);
  });
});

describe('stays', () => {
  test('of a station or an instrument never overlap; touching ends are no overlap', async () => {
    const [first, second] = [await addInstrument(), await addInstrument()];
    expect((await deploy(first, 'RD-1', '2026-03-01T00:00:00Z', '2026-04-01T00:00:00Z')).status).toBe(201);
    const refused: [number, string, string, string | null][] = [
      [second, 'RD-1', '2026-03-31T23:59:59Z', null],
      [second, 'RD-1', '2026-02-01T00:00:00Z', '2026-03-01T00:00:01Z'],
      [second, 'RD-1', '2026-02-01T00:00:00Z', '2026-05-01T00:00:00Z'],
      [first, 'RD-2', '2026-03-15T00:00:00Z', '2026-03-16T00:00:00Z'],
    ];
    for (const [id, station, from, to] of refused) {
      const response = await deploy(id, station, from, to);
      expect(response.status, `${station} ${from}`).toBe(422);
      expect(await problemsOf(response)).toMatchObject([{ field: 'from' }]);
    }
    expect((await deploy(second, 'RD-1', '2026-04-01T00:00:00Z')).status).toBe(201);
    expect((await deploy(first, 'RD-2', '2026-04-01T00:00:00Z')).status).toBe(201);
    const [stationId = 0] = stationIds;
    const standingAt = async (instant: string) =>
      (await selectStaysAt(stationId, at(instant), at(instant) + 1)).map(({ instrumentId }) => instrumentId);
    expect(await standingAt('2026-03-31T23:59:59Z')).toEqual([first]);
    expect(await standingAt('2026-04-01T00:00:00Z')).toEqual([second]);
    expect(await standingAt('2026-02-28T23:59:59Z')).toEqual([]);
  });

  test('of eight that are noted at once for one station one stands', async () => {
    const home = await db()('networks').where({ slug: 'reeds' }).first('id');
    await makeStation(home.id, 'RD-9');
    const ids = await Promise.all(Array.from({ length: 8 }, () => addInstrument()));
    const answers = await Promise.all(ids.map((id) => deploy(id, 'RD-9', '2026-03-01T00:00:00Z')));
    expect(answers.map(({ status }) => status).sort()).toEqual([201, ...Array(7).fill(422)]);
  });

  test('a withdrawn one makes room and says why; it is not withdrawn twice', async () => {
    const [first, second] = [await addInstrument(), await addInstrument()];
    const from = '2019-01-01T00:00:00Z';
    const to = '2019-06-01T00:00:00Z';
    const { deployment } = await (await deploy(first, 'RD-1', from, to)).json();
    const path = `${base}/${first}/deployments/${deployment.id}/withdrawal`;
    const withdrawn = await callApi('POST', path, { ...operator, body: { reason: 'wrong station' } });
    expect((await withdrawn.json()).deployment.withdrawal).toMatchObject({ reason: 'wrong station' });
    expect((await callApi('POST', path, { ...operator, body: { reason: 'again' } })).status).toBe(409);
    expect((await deploy(second, 'RD-1', from, to)).status).toBe(201);
    const csv = await (await callApi('GET', `${base}.csv`, regulator)).text();
    expect(csv).toContain(`RD-1,${from},${to},,wrong station`);
  });

  test('end after they begin, and not in the far future', async () => {
    const id = await addInstrument();
    const { deployment } = await (
      await deploy(id, 'RD-1', '2018-01-01T00:00:00Z', '2018-02-01T00:00:00Z')
    ).json();
    const path = `${base}/${id}/deployments/${deployment.id}/end`;
    for (const to of ['2018-01-01T00:00:00Z', '2099-01-01T00:00:00Z']) {
      const response = await callApi('POST', path, { ...operator, body: { to } });
      expect(response.status).toBe(422);
      expect(await problemsOf(response)).toMatchObject([{ field: 'to' }]);
    }
    expect((await deploy(id, 'RD-2', '2099-01-01T00:00:00Z')).status).toBe(422);
  });
});
