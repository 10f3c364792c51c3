import { gzipSync } from 'node:zlib';
import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { takeWeatherFile } from '#lib/services/weather/file';
import { networkWind } from '#lib/services/weather/networkWind';
import { stationWindWords } from '#lib/services/weather/periodWind';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const base = '/api/v1/networks/windy';
let operator: { session: string };
let regulator: { session: string };
let token: string;
const MAST = { code: 'WI-W1', name: 'Pier head', latitude: 54, longitude: -1.5, height: 10 };

beforeAll(async () => {
  const home = await makeNetwork('windy');
  operator = await makePerson(home, ['operator']);
  regulator = await makePerson(home, ['regulator']);
  await makeStation(home, 'WI-1');
  const answer = await callApi('POST', `${base}/masts`, { ...operator, body: MAST });
  expect(answer.status).toBe(201);
  ({ token } = await answer.json());
});

const record = (minute: number, more: object = {}) => ({
  start: `2026-03-01T00:${String(minute).padStart(2, '0')}:00Z`,
  seconds: 60,
  windSpeed: 3.2,
  windDirection: 240,
  ...more,
});
const post = (records: unknown[]) => callApi('POST', '/api/v1/weather', { token, body: { records } });

describe('a mast posts', () => {
  test('accepted, known, refused with a reason; one bad record never costs a good one', async () => {
    expect(await (await post([record(0), record(1)])).json()).toMatchObject({ accepted: 2, known: 0 });
    const bad = [
      record(1, { windSpeed: 9 }),
      record(0),
      { start: 'x' },
      record(2, { windSpeed: 300 }),
      record(3),
    ];
    const answer = await (
      await post([...bad, { ...record(3), seconds: 3600, start: '2026-02-28T23:30:00Z' }])
    ).json();
    expect(answer).toMatchObject({ accepted: 1, known: 1 });
    expect(answer.refused.map(({ index, code }: { index: number; code: string }) => [index, code])).toEqual([
      [0, 'conflict'],
      [2, 'malformed'],
      [3, 'out-of-range'],
      [5, 'overlap'],
    ]);
    const ahead = new Date(Date.now() + 3_600_000).toISOString().replace(/\.\d+/, '');
    expect((await (await post([record(0, { start: ahead })])).json()).refused[0].code).toBe('clock-ahead');
  });

  test('a wrong token, another’s token and what is no list are told', async () => {
    expect((await callApi('POST', '/api/v1/weather', { token: 'bm_x', body: {} })).status).toBe(401);
    expect((await callApi('POST', '/api/v1/intervals', { token, body: {} })).status).toBe(401);
    expect((await post([])).status).toBe(422);
    const headers = { 'content-type': 'application/json', 'content-encoding': 'gzip' };
    const body = gzipSync(JSON.stringify({ records: [record(4)] }));
    expect((await callApi('POST', '/api/v1/weather', { token, headers, body })).status).toBe(200);
  });
});

describe('what was refused', () => {
  const refused = async (state = 'open') => {
    const path = `${base}/masts/WI-W1/refused?state=${state}`;
    const { items } = await (await callApi('GET', path, regulator)).json();
    return items as { id: number; code: string; timesReceived: number; record: unknown; settled: unknown }[];
  };
  const settle = async (body: object, by = operator) =>
    callApi('POST', `${base}/masts/WI-W1/refused/settlements`, { ...by, body });
  const windAt = (minute: number) =>
    db()('weather_records')
      .where({ starts_at: Date.parse(record(minute).start) / 1000 })
      .pluck('wind_speed_centi_ms');

  test('is kept as it came, once, and released, dismissed and reopened by an operator', async () => {
    const bad = record(1, { windSpeed: 9 });
    await post([bad]);
    const open = await refused();
    const conflict = open.find(({ record: kept }) => JSON.stringify(kept) === JSON.stringify(bad));
    expect(conflict).toMatchObject({ code: 'conflict', timesReceived: 2, record: bad });
    expect(open.map(({ code }) => code).sort()).toEqual([
      'clock-ahead',
      'conflict',
      'malformed',
      'out-of-range',
      'overlap',
    ]);
    const malformed = open.find(({ code }) => code === 'malformed');
    const [ids, reason] = [[malformed?.id], 'The logger was being set up.'];
    expect((await settle({ act: 'dismiss', ids }, operator)).status).toBe(422);
    expect((await settle({ act: 'dismiss', ids, reason }, regulator)).status).toBe(403);
    const { outcome } = await (await settle({ act: 'dismiss', ids, reason })).json();
    expect(outcome).toMatchObject({ settled: 1, passedOver: 0 });
    expect(await refused('dismissed')).toMatchObject([{ settled: { reason } }]);
    await settle({ act: 'reopen', ids });
    expect(await refused('dismissed')).toEqual([]);
    const all = await (await settle({ act: 'release' })).json();
    expect(all.outcome).toMatchObject({ settled: 0, passedOver: 5 });
  });

  test('a released conflict takes the place of the stored record, which can be put back the same way', async () => {
    const conflict = (await refused()).find(({ code }) => code === 'conflict');
    const reason = 'The mast’s own log shows it.';
    expect((await settle({ act: 'replace', ids: [conflict?.id] })).status).toBe(422);
    await settle({ act: 'replace', ids: [conflict?.id], reason });
    expect(await windAt(1)).toEqual([900]);
    const [before] = await refused('superseded');
    expect(before).toMatchObject({ record: { windSpeed: 3.2, windDirection: 240 } });
    await settle({ act: 'replace', ids: [before?.id], reason: 'It was right.' });
    expect(await windAt(1)).toEqual([320]);
    const acts = await db()('audit_log').where('action', 'weather-quarantine.replace');
    expect(acts).toHaveLength(2);
  });
});

describe('people', () => {
  test('operators add, assign and end; a station has one mast at a time; every role sees', async () => {
    expect((await callApi('POST', `${base}/masts`, { ...regulator, body: MAST })).status).toBe(403);
    expect((await callApi('POST', `${base}/masts`, { ...operator, body: MAST })).status).toBe(422);
    const path = `${base}/masts/WI-W1/assignments`;
    const from = '2026-03-01T00:00:00Z';
    const assign = (body: object) => callApi('POST', path, { ...operator, body });
    const { assignment } = await (await assign({ station: 'WI-1', from })).json();
    expect((await assign({ station: 'WI-1', from: '2026-04-01T00:00:00Z' })).status).toBe(422);
    expect((await assign({ station: 'none', from })).status).toBe(422);
    const end = `${base}/mast-assignments/${assignment.id}/end`;
    const to = '2026-03-05T00:00:00Z';
    expect((await callApi('POST', end, { ...operator, body: { to } })).status).toBe(200);
    expect((await callApi('POST', end, { ...operator, body: { to: '2026-03-09T00:00:00Z' } })).status).toBe(
      422,
    );
    expect((await assign({ station: 'WI-1', from: to })).status).toBe(201);
    const { items } = await (await callApi('GET', `${base}/masts`, regulator)).json();
    expect(items).toMatchObject([{ code: 'WI-W1', last: { windSpeed: 3.2 }, assignments: [{}, { to }] }]);
    expect(await db()('audit_log').where('action', 'like', 'mast.%')).toHaveLength(4);
  });

  test('records as a file, for every role', async () => {
    const period = '?from=2026-03-01T00:01:00Z&to=2026-03-01T00:02:00Z';
    const file = await callApi('GET', `${base}/masts/WI-W1/records.csv${period}`, regulator);
    expect(await file.text()).toBe(
      'start,seconds,windSpeed,windDirection,rain,temperature\r\n2026-03-01T00:01:00Z,60,3.2,240,,\r\n',
    );
  });

  test('wind for maps and figures, with its source and age; a file is tried before it is taken', async () => {
    const { id: networkId } = await db()('networks').where({ slug: 'windy' }).first('id');
    const atSec = Date.parse('2026-03-01T00:07:00Z') / 1000;
    expect(await networkWind(networkId, atSec)).toMatchObject([
      { source: 'mast', code: 'WI-W1', speedMs: 3.2, fromDeg: 240, ageSec: 120 },
    ]);
    expect(await networkWind(networkId, atSec + 7200)).toEqual([]);
    const period = { fromSec: atSec - 420, toSec: atSec - 300 };
    const words = await stationWindWords(networkId, 'WI-1', period);
    expect(words).toBe(
      'mean 3.2 m/s from WSW (240°), highest 3.2 m/s, by mast WI-W1 (Pier head), 2 min of 2 min',
    );
    const wind = async (to: string) => {
      const path = `${base}/stations/WI-1/statistics?from=2026-03-01T00:00:00Z&to=${to}`;
      return (await (await callApi('GET', path, regulator)).json()).wind as unknown;
    };
    const byMast = { source: 'mast', mast: { code: 'WI-W1', name: 'Pier head' } };
    expect(await wind('2026-03-01T00:15:00Z')).toMatchObject([{ ...byMast, seconds: 240, meanSpeed: 3.2 }]);
    const month = [await wind('2026-03-20T00:00:00Z')].flat();
    expect(month).toMatchObject(Array(2).fill({ ...byMast, meanSpeed: null }));
    const { id, maximum_age_sec: maximumAgeSec } = await db()('masts').first('id', 'maximum_age_sec');
    const text = 'start;seconds;windSpeed\n2026-03-01T01:00:00Z;600;4,5\n2026-03-01T01:05:00Z;600;4\nx;1;1';
    const take = (isTrial: boolean) => takeWeatherFile({ id, maximumAgeSec }, text, isTrial);
    const told = { accepted: 1, known: 0, refused: [{ line: 3 }, { line: 4 }] };
    expect(await take(true)).toMatchObject({ kind: 'done', value: told });
    expect(await take(false)).toMatchObject({ kind: 'done', value: told });
    expect(await take(true)).toMatchObject({ value: { accepted: 0, known: 1 } });
  });

  test('a retired mast’s posts are refused', async () => {
    const { code, ...facts } = MAST;
    const retired = { ...operator, body: { ...facts, maximumAge: 15, isRetired: true } };
    expect((await callApi('PATCH', `${base}/masts/${code}`, retired)).status).toBe(200);
    expect((await post([record(9)])).status).toBe(401);
  });
});
