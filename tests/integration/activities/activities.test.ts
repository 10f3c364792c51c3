import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { hear } from '../plants/support/tones';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const base = '/api/v1/networks/berths';
const at = (text: string) => Date.parse(text) / 1000;
const csvType = { 'content-type': 'text/csv' };
let operator: { session: string };
let regulator: { session: string };
let stationId: number;

beforeAll(async () => {
  const home = await makeNetwork('berths');
  operator = await makePerson(home, ['operator']);
  regulator = await makePerson(home, ['regulator']);
  stationId = await makeStation(home, 'BE-1');
});

const send = (body: string) =>
  callApi('POST', `${base}/activities.csv`, { ...operator, headers: csvType, body });

describe('the operations log', () => {
  test('one entry by the interface; withdrawn once, kept, and left out of the file', async () => {
    const from = '2026-02-01T08:00:00Z';
    const body = { kind: 'blast', place: 'North face', from, to: '2026-02-01T08:01:00Z' };
    expect((await callApi('POST', `${base}/activities`, { ...regulator, body })).status).toBe(403);
    const answer = await callApi('POST', `${base}/activities`, { ...operator, body });
    expect(answer.status).toBe(201);
    const { activity } = await answer.json();
    expect(activity).toMatchObject({ kind: 'blast', from, withdrawal: null });
    const backwards = await callApi('POST', `${base}/activities`, {
      ...operator,
      body: { ...body, to: from },
    });
    expect((await backwards.json()).fields).toMatchObject([{ field: 'to' }]);

    const path = `${base}/activities/${activity.id}/withdrawal`;
    const reason = { ...operator, body: { reason: 'Postponed' } };
    expect((await callApi('POST', path, reason)).status).toBe(200);
    expect((await callApi('POST', path, reason)).status).toBe(409);
    const list = await callApi('GET', `${base}/activities?from=${from}&to=2026-02-02T00:00:00Z`, regulator);
    expect((await list.json()).items).toMatchObject([{ withdrawal: { reason: 'Postponed' } }]);
    const file = await (await callApi('GET', `${base}/activities.csv`, regulator)).text();
    expect(file).toBe('kind,place,from,to,note\r\n');
    expect(await db()('audit_log').where({ action: 'activity.withdraw' })).toHaveLength(1);
  });

  test('a file: local times, semicolons, bad lines told; what the log gives out is all known', async () => {
    const answer = await send(
      [
        'From;To;Kind;Place;Note',
        '2026-07-01T10:00;2026-07-01 12:00;shift;;=late',
        'yesterday;2026-07-01T12:00;shift;;',
        '2026-07-02T10:00:00Z;2026-07-02T09:00:00Z;shift;;',
      ].join('\n'),
    );
    expect(answer.status).toBe(200);
    expect(await answer.json()).toMatchObject({ added: 1, known: 0, refused: [{ line: 3 }, { line: 4 }] });
    const [entry] = (await (await callApi('GET', `${base}/activities?kind=shift`, regulator)).json()).items;
    expect(entry).toMatchObject({ from: '2026-07-01T09:00:00Z', to: '2026-07-01T11:00:00Z', note: '=late' });
    const file = await (await callApi('GET', `${base}/activities.csv`, regulator)).text();
    expect(await (await send(file)).json()).toEqual({ added: 0, known: 1, refused: [] });
    expect((await send('a,b\n1,2')).status).toBe(422);
    expect((await send('kind,from,to\n"x')).status).toBe(422);
    expect((await send('')).status).toBe(422);
  });
});

describe('with and without', () => {
  const compare = async (kind: string, from: string, to: string) => {
    const query = `kind=${encodeURIComponent(kind)}&from=${from}&to=${to}`;
    const answer = await callApi('GET', `${base}/stations/BE-1/activity-comparison?${query}`, regulator);
    expect(answer.status).toBe(200);
    return answer.json();
  };

  beforeAll(async () => {
    // Twelve days; a ship at berth 10–12 h on the first six, 9 to 11 dB louder then, with a hum at 100 Hz.
    const lines = ['kind,from,to'];
    for (let day = 1; day <= 12; day += 1) {
      const date = `2026-03-${String(day).padStart(2, '0')}`;
      const isShip = day <= 6;
      if (isShip) lines.push(`ship at berth,${date}T10:00:00Z,${date}T12:00:00Z`);
      const levelDb = (isShip ? 50 : 40) + ((day % 3) - 1);
      const tone = isShip ? { tone: { hz: 100, aboveDb: 6 } } : {};
      await hear(stationId, {
        fromSec: at(`${date}T10:00:00Z`),
        toSec: at(`${date}T12:00:00Z`),
        levelDb,
        ...tone,
      });
      await hear(stationId, {
        fromSec: at(`${date}T14:00:00Z`),
        toSec: at(`${date}T14:15:00Z`),
        levelDb: 70,
      });
    }
    expect(await (await send(lines.join('\n'))).json()).toMatchObject({ added: 6, refused: [] });
  });

  test('numbers, means, spread, difference and its uncertainty, by band too', async () => {
    const found = await compare('ship at berth', '2026-03-01T00:00:00Z', '2026-03-13T00:00:00Z');
    expect(found.on).toMatchObject({ quarterHours: 48, occasions: 6 });
    expect(found.off).toMatchObject({ quarterHours: 48, occasions: 6 });
    expect(found.on.mean).toBeCloseTo(58, 6);
    expect(found.off.mean).toBeCloseTo(48, 6);
    expect(found.difference).toBeCloseTo(10, 6);
    // Six occasions of −1, 0, 1, twice: s = √(4/5), u = s/√6 on each side.
    expect(found.expandedUncertainty).toBeCloseTo(2 * Math.sqrt((2 * (4 / 5)) / 6), 6);
    expect(found.caution).toContain('larger than its uncertainty');
    const band = (hz: number) => found.bands.find((one: { nominalHz: number }) => one.nominalHz === hz);
    expect(band(100).difference).toBeCloseTo(16, 6);
    expect(band(1000).difference).toBeCloseTo(10, 6);
  });

  test('few samples are said to be few', async () => {
    const few = await compare('ship at berth', '2026-03-05T00:00:00Z', '2026-03-09T00:00:00Z');
    expect(few.expandedUncertainty).toBeNull();
    expect(few.caution).toContain('Too few');
    const none = await compare('blast', '2026-03-05T00:00:00Z', '2026-03-09T00:00:00Z');
    expect(none).toMatchObject({ difference: null, on: { quarterHours: 0, mean: null } });
    expect(none.caution).toContain('nothing to compare');
  });
});
