import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { hear } from './support/tones';

useFreshSchema();

const base = '/api/v1/networks/silos';
const at = (text: string) => Date.parse(text) / 1000;
let operator: { session: string };
let regulator: { session: string };
let stationId: number;

beforeAll(async () => {
  const home = await makeNetwork('silos');
  operator = await makePerson(home, ['operator']);
  regulator = await makePerson(home, ['regulator']);
  stationId = await makeStation(home, 'SI-1');
});

async function addPlant(body: Record<string, unknown>): Promise<number> {
  const answer = await callApi('POST', `${base}/plants`, { ...operator, body });
  const told = await answer.json();
  expect(answer.status, JSON.stringify(told)).toBe(201);
  return told.plant.id;
}

async function candidatesOf(from: string, to: string) {
  const answer = await callApi(
    'GET',
    `${base}/stations/SI-1/plant-candidates?from=${from}&to=${to}`,
    regulator,
  );
  expect(answer.status).toBe(200);
  return answer.json();
}

describe('the register', () => {
  test('what goes together is checked, and only an operator changes it', async () => {
    const wrong: [string, Record<string, unknown>][] = [
      ['minRpm', { name: 'x', kind: 'fan', blades: 4 }],
      ['maxRpm', { name: 'x', kind: 'fan', minRpm: 900, maxRpm: 600 }],
      ['poles', { name: 'x', kind: 'fan', poles: 3, mainsHz: 50 }],
      ['mainsHz', { name: 'x', kind: 'fan', poles: 4 }],
      ['strokes', { name: 'x', kind: 'engine', minRpm: 900, cylinders: 6 }],
      ['to', { name: 'x', kind: 'fan', from: '07:00', to: '07:00' }],
      ['longitude', { name: 'x', kind: 'fan', latitude: 54 }],
      ['kind', { name: 'x', kind: 'volcano' }],
    ];
    for (const [field, body] of wrong) {
      const answer = await callApi('POST', `${base}/plants`, { ...operator, body });
      expect(answer.status, field).toBe(422);
      expect((await answer.json()).fields).toMatchObject([{ field }]);
    }
    const body = { name: 'Somebody’s', kind: 'fan' };
    expect((await callApi('POST', `${base}/plants`, { ...regulator, body })).status).toBe(403);
  });

  test('a change makes a version, keeps those before and is audited; a name is not given twice', async () => {
    const id = await addPlant({ name: 'Wash pump', kind: 'pump', minRpm: 2900, blades: 6 });
    const path = `${base}/plants/${id}`;
    const changed = { name: 'Wash pump', kind: 'pump', minRpm: 2950, blades: 7, reason: 'new impeller' };
    const answer = await callApi('POST', `${path}/versions`, { ...operator, body: changed });
    expect(answer.status).toBe(201);
    const { plant, versions } = await (await callApi('GET', path, regulator)).json();
    expect(plant).toMatchObject({ version: 2, blades: 7, minRpm: 2950, maxRpm: 2950 });
    expect(versions).toMatchObject([
      { version: 1, blades: 6, maxRpm: 2900 },
      { version: 2, reason: 'new impeller' },
    ]);
    const entry = await db()('audit_log').where({ action: 'plant.change' }).first('detail');
    expect(entry.detail).toMatchObject({ before: { blades: 6 }, after: { blades: 7 } });
    const taken = await callApi('POST', `${base}/plants`, {
      ...operator,
      body: { name: 'wash pump', kind: 'pump' },
    });
    expect(taken.status).toBe(422);
    const retirement = { ...operator, body: { retired: true, reason: 'sold' } };
    expect((await callApi('POST', `${path}/retirement`, retirement)).status).toBe(200);
    expect((await callApi('POST', `${path}/retirement`, retirement)).status).toBe(422);
    const file = await (await callApi('GET', `${base}/plants.csv`, regulator)).text();
    expect(file.split('\r\n')[0]).toContain('name,kind,latitude');
    expect(file).toContain('Wash pump,pump,,,2950,2950,7');
  });
});

describe('candidates', () => {
  const night = ['2026-03-02T22:00:00Z', '2026-03-02T23:00:00Z'] as const;
  const day = ['2026-03-03T12:00:00Z', '2026-03-03T13:00:00Z'] as const;
  let fan: number;
  let transformer: number;

  beforeAll(async () => {
    const schedule = { weekdays: ['mon', 'tue', 'wed', 'thu', 'fri'], from: '21:00', to: '06:00' };
    fan = await addPlant({ name: 'Silo fan', kind: 'fan', minRpm: 1480, blades: 8, ...schedule });
    transformer = await addPlant({ name: 'Transformer 2', kind: 'transformer', mainsHz: 50 });
    await addPlant({ name: 'Yard pump', kind: 'pump', minRpm: 2900, blades: 7 });
    const tone = { hz: (1480 / 60) * 8, aboveDb: 14 };
    await hear(stationId, { fromSec: at(night[0]), toSec: at(night[1]), levelDb: 40, tone });
    await hear(stationId, { fromSec: at(day[0]), toSec: at(day[1]), levelDb: 60 });
  });

  test('a tone at a plant’s blade-pass frequency names that plant first, and says why', async () => {
    const { state, standingOut, candidates } = await candidatesOf(...night);
    expect(state).toBe('assessed');
    expect(standingOut).toMatchObject([{ isTone: true }]);
    expect(candidates.map((one: { plant: number }) => one.plant)).toEqual([fan, transformer]);
    expect(candidates[0]).toMatchObject({ source: 'blade-pass', scheduledShare: 1, rangesExplained: 1 });
    expect(candidates[0].reason).toBe(
      'blade-pass of Silo fan, 24.67 Hz × 8 blades = 197.3 Hz, inside the 200 Hz third; scheduled Mon–Fri 21:00–06:00',
    );
    expect(candidates[1].reason).toContain('2nd harmonic of the hum at twice the mains frequency');
  });

  test('a broadband sound names none, however loud; a period without data none either', async () => {
    expect(await candidatesOf(...day)).toMatchObject({ state: 'assessed', standingOut: [], candidates: [] });
    expect(await candidatesOf('2026-03-05T00:00:00Z', '2026-03-05T01:00:00Z')).toMatchObject({
      state: 'no-data',
      coverage: 0,
      candidates: [],
    });
  });

  test('octaves are too wide', async () => {
    const { id } = await db()('networks').where({ slug: 'silos' }).first('id');
    await makeStation(id, 'SI-8', { bandFraction: 1, firstBandIndex: -15, lastBandIndex: 9 });
    const [from, to] = night;
    const path = `${base}/stations/SI-8/plant-candidates?from=${from}&to=${to}`;
    expect((await (await callApi('GET', path, regulator)).json()).candidates).toEqual([]);
  });

  test('a plant that was not scheduled comes last and says so', async () => {
    const tone = { hz: (1480 / 60) * 8, aboveDb: 14 };
    const [from, to] = ['2026-03-04T12:00:00Z', '2026-03-04T13:00:00Z'];
    await hear(stationId, { fromSec: at(from), toSec: at(to), levelDb: 40, tone });
    const { candidates } = await candidatesOf(from, to);
    expect(candidates.map((one: { plant: number }) => one.plant)).toEqual([transformer, fan]);
    expect(candidates[1].reason).toContain('not in this period');
  });

  test('a person’s finding is kept with the words that named it, beside earlier ones, and audited', async () => {
    const path = `${base}/stations/SI-1/plant-candidates`;
    const [from, to] = night;
    const body = { from, to, plant: fan, verdict: 'rejected', note: '' };
    expect((await callApi('POST', path, { ...regulator, body })).status).toBe(403);
    expect((await callApi('POST', path, { ...operator, body })).status).toBe(201);
    const confirmed = { ...body, verdict: 'confirmed', note: 'Heard at the gate' };
    expect((await callApi('POST', path, { ...operator, body: confirmed })).status).toBe(201);
    const foreign = await callApi('POST', path, { ...operator, body: { ...body, plant: 9999 } });
    expect(foreign.status).toBe(422);
    const { findings } = await candidatesOf(...night);
    expect(findings).toMatchObject([
      { plant: fan, verdict: 'confirmed', note: 'Heard at the gate', from: '2026-03-02T22:00:00Z' },
      { plant: fan, verdict: 'rejected' },
    ]);
    expect(findings[0].namedBecause).toContain('blade-pass of Silo fan');
    expect(
      await db()('audit_log').where({ action: 'plant.confirm', subject: 'plant Silo fan' }),
    ).toHaveLength(1);
  });
});
