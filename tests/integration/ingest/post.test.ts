import { gzipSync } from 'node:zlib';
import { beforeAll, beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { MOST_INTERVALS } from '#lib/contracts/intervals';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

useFreshSchema();

const BANDS = [25, 31.5, 40, 50, 63, 80, 100];
let networkId: number;
let stationId: number;
let token: string;
let stations = 0;

beforeAll(async () => {
  networkId = await makeNetwork('quay');
});

beforeEach(async () => {
  stations += 1;
  stationId = await makeStation(networkId, `QY-${stations}`);
  token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
});

const interval = (start: string, changes: Record<string, unknown> = {}) => ({
  start,
  seconds: 60,
  LAeq: 52.3,
  LAFmax: 61.2,
  LAFmin: 44,
  LCeq: 60.1,
  levels: [48.1, null, 47.7, 46, 44.9, 41, 39.2],
  flags: ['rain'],
  windSpeed: 2.3,
  battery: 12.4,
  ...changes,
});

async function post(intervals: unknown[], bands: unknown = BANDS) {
  const response = await callApi('POST', '/api/v1/intervals', { token, body: { bands, intervals } });
  expect(response.status).toBe(200);
  return (await response.json()) as {
    accepted: number;
    known: number;
    refused: { index: number; code: string; detail: string; quarantined: boolean }[];
  };
}

const stored = () => db()('interval_levels').where({ station_id: stationId }).orderBy('starts_at');

test('an accepted interval is stored as sent, with its quarter marked and the latest noted', async () => {
  expect(await post([interval('2026-03-01T02:14:30+02:00')])).toMatchObject({
    accepted: 1,
    known: 0,
    refused: [],
  });
  const [row] = await stored();
  expect(row).toMatchObject({
    starts_at: Date.parse('2026-03-01T00:14:30Z') / 1000,
    laeq_centi_db: 5230,
    lcpeak_centi_db: null,
  });
  expect(row.band_levels_centi_db.readInt16LE(0)).toBe(4810);
  expect(row.band_levels_centi_db.readInt16LE(2)).toBe(-32768);
  const marks = await db()('dirty_marks').where({ station_id: stationId }).pluck('quarter_starts_at');
  expect(marks.sort()).toEqual([
    Date.parse('2026-03-01T00:00:00Z') / 1000,
    Date.parse('2026-03-01T00:15:00Z') / 1000,
  ]);
  expect(await db()('station_latest').where({ station_id: stationId }).first()).toMatchObject({
    laeq_centi_db: 5230,
  });
});

test('the same again is known, whatever it leaves out; another level for the same start is a conflict', async () => {
  const first = interval('2026-03-01T00:00:00Z');
  await post([first]);
  expect(await post([first])).toMatchObject({ accepted: 0, known: 1 });
  expect(await post([{ start: first.start, seconds: 60, LAeq: 52.3 }])).toMatchObject({ known: 1 });
  expect(
    await post([interval(first.start, { LAeq: 52.301, levels: first.levels.map(() => null) })]),
  ).toMatchObject({ known: 1 });
  const { refused } = await post([interval(first.start, { LAeq: 52.31 })]);
  expect(refused).toMatchObject([{ index: 0, code: 'conflict', quarantined: true }]);
  expect((await stored())[0].laeq_centi_db).toBe(5230);
});

test('one bad record never costs a good one, and each bad one is kept with its reason', async () => {
  const ahead = new Date(Date.now() + 3_600_000).toISOString().replace(/\.\d+/, '');
  const { accepted, refused } = await post([
    interval('2026-03-01T00:00:00Z'),
    interval('2026-03-01T00:00:30Z'),
    interval(ahead),
    interval('2026-03-01T00:02:00Z', { LAeq: 290 }),
    interval('2026-03-01T00:03:00Z', { levels: [1, 2] }),
    interval('2026-03-01T00:04:00Z', { flags: ['bogus'] }),
    interval('2026-02-30T00:04:00Z'),
    interval('2026-03-01T00:05:00.5Z'),
    { seconds: 60, LAeq: 50 },
    { start: '2026-03-01T00:06:00Z', seconds: 60, levels: BANDS.map(() => 40) },
    null,
    interval('2026-03-01T00:07:00Z'),
  ]);
  expect(accepted).toBe(2);
  expect(refused.map(({ index, code }) => [index, code])).toEqual([
    [1, 'overlap'],
    [2, 'clock-ahead'],
    [3, 'out-of-range'],
    [4, 'malformed'],
    [5, 'malformed'],
    [6, 'malformed'],
    [7, 'malformed'],
    [8, 'malformed'],
    [9, 'malformed'],
    [10, 'malformed'],
  ]);
  const kept = await db()('quarantine').where({ station_id: stationId }).orderBy('id');
  expect(kept).toHaveLength(10);
  expect(JSON.parse(kept[2].record)).toMatchObject({ bands: BANDS, interval: { LAeq: 290 } });
});

test('a refused record sent again is kept once and counted', async () => {
  const bad = interval('2026-03-01T00:00:00Z', { LAeq: 290 });
  await post([bad]);
  await post([bad]);
  expect(await db()('quarantine').where({ station_id: stationId })).toMatchObject([{ times_received: 2 }]);
});

test('a post as large as any, with every record refused, is kept whole', async () => {
  const records = Array.from({ length: MOST_INTERVALS }, (_, at) => ({
    start: new Date(Date.UTC(2026, 2, 1, 0, at)).toISOString(),
    seconds: 60,
    LAeq: 290,
    note: "'\\".repeat(200),
  }));
  const { accepted, refused } = await post(records);
  expect(accepted).toBe(0);
  expect(refused).toHaveLength(MOST_INTERVALS);
  expect(await db()('quarantine').where({ station_id: stationId }).count({ count: '*' }).first()).toEqual({
    count: MOST_INTERVALS,
  });
});

test('bands that are not the station’s refuse every record', async () => {
  const { accepted, refused } = await post(
    [interval('2026-03-01T00:00:00Z')],
    [26, 31.5, 40, 50, 63, 80, 100],
  );
  expect(accepted).toBe(0);
  expect(refused).toMatchObject([{ code: 'unknown-band' }]);
  expect((await post([interval('2026-03-01T00:00:00Z')], [...BANDS].reverse())).refused[0]?.code).toBe(
    'unknown-band',
  );
});

test('LAeq left out is computed from thirds that cover 50 Hz–8 kHz, and marked', async () => {
  const bands = [
    50, 63, 80, 100, 125, 160, 200, 250, 315, 400, 500, 630, 800, 1000, 1250, 1600, 2000, 2500, 3150, 4000,
    5000, 6300, 8000,
  ];
  const levels = bands.map((hz) => (hz === 1000 ? 80 : 0));
  expect(await post([{ start: '2026-03-01T00:00:00Z', seconds: 60, levels }], bands)).toMatchObject({
    accepted: 1,
  });
  const [row] = await stored();
  expect(row.laeq_centi_db).toBe(8000);
  expect(row.flags & 0x8000).toBe(0x8000);
});

test('data before the station takes any are refused as too old', async () => {
  await db()('stations')
    .where({ id: stationId })
    .update({ accepts_from: Date.parse('2026-03-01T00:00:00Z') / 1000 });
  const { accepted, refused } = await post([
    interval('2026-02-28T23:59:00Z'),
    interval('2026-03-01T00:00:00Z'),
  ]);
  expect(accepted).toBe(1);
  expect(refused).toMatchObject([{ index: 0, code: 'too-old' }]);
});

test('keys of the prototype are data like any other', async () => {
  const body = `{"bands":[25],"intervals":[{"start":"2026-03-01T00:00:00Z","seconds":60,"LAeq":50,"__proto__":{"LAFmax":99},"constructor":1}]}`;
  const headers = { 'content-type': 'application/json' };
  expect((await callApi('POST', '/api/v1/intervals', { token, body, headers })).status).toBe(200);
  expect((await stored())[0].lafmax_centi_db).toBeNull();
  expect(({} as { LAFmax?: number }).LAFmax).toBeUndefined();
});

test('gzip is inflated; a bomb is stopped at the limit', async () => {
  const headers = { 'content-type': 'application/json', 'content-encoding': 'gzip' };
  const good = gzipSync(JSON.stringify({ bands: BANDS, intervals: [interval('2026-03-01T00:00:00Z')] }));
  expect((await callApi('POST', '/api/v1/intervals', { token, body: good, headers })).status).toBe(200);
  const bomb = gzipSync(Buffer.alloc(200 * 1024 * 1024, ' '));
  const before = process.memoryUsage().rss;
  expect((await callApi('POST', '/api/v1/intervals', { token, body: bomb, headers })).status).toBe(413);
  expect(process.memoryUsage().rss - before).toBeLessThan(100 * 1024 * 1024);
  const broken = good.subarray(0, good.length - 12);
  expect((await callApi('POST', '/api/v1/intervals', { token, body: broken, headers })).status).toBe(422);
});

test.each([
  ['no JSON', '{', 422],
  ['a list', '[]', 422],
  ['no intervals', '{"bands":[25]}', 422],
  ['empty intervals', '{"bands":[25],"intervals":[]}', 422],
  ['bands that are no list', '{"bands":"25","intervals":[{}]}', 422],
  ['bands that are no numbers', '{"bands":["25"],"intervals":[{}]}', 422],
  ['more bands than there are', JSON.stringify({ bands: Array(34).fill(25), intervals: [{}] }), 422],
  ['a time of sending that is none', '{"bands":[25],"sentAt":"noon","intervals":[{}]}', 422],
  ['an empty body', '', 422],
  ['too many', JSON.stringify({ bands: [25], intervals: Array.from({ length: 10_001 }, () => 0) }), 413],
])('%s is answered with a clear problem', async (_, body, status) => {
  const response = await callApi('POST', '/api/v1/intervals', {
    token,
    body,
    headers: { 'content-type': 'application/json' },
  });
  expect(response.status).toBe(status);
  expect(response.headers.get('content-type')).toBe('application/problem+json');
  expect(await response.json()).toMatchObject({
    status,
    title: expect.any(String),
    detail: expect.any(String),
  });
});

test('token and content type are required', async () => {
  const body = { bands: BANDS, intervals: [interval('2026-03-01T00:00:00Z')] };
  expect((await callApi('POST', '/api/v1/intervals', { body })).status).toBe(401);
  expect((await callApi('POST', '/api/v1/intervals', { token: 'bs_unknown', body })).status).toBe(401);
  const plain = { token, body: JSON.stringify(body), headers: { 'content-type': 'text/plain' } };
  expect((await callApi('POST', '/api/v1/intervals', plain)).status).toBe(415);
  await db()('station_tokens').where({ station_id: stationId }).update({ revoked_at: new Date() });
  expect((await callApi('POST', '/api/v1/intervals', { token, body })).status).toBe(401);
});

test('what changes about a station counts at its next post, although the station is remembered', async () => {
  await post([interval('2026-03-01T00:00:00Z')]);
  const bound = Date.parse('2026-03-01T00:10:00Z') / 1000;
  await db()('stations').where({ id: stationId }).update({ accepts_from: bound });
  expect((await post([interval('2026-03-01T00:01:00Z')])).refused).toMatchObject([{ code: 'too-old' }]);
  expect(await post([interval('2026-03-01T00:10:00Z')])).toMatchObject({ accepted: 1 });
  const send = () => callApi('POST', '/api/v1/intervals', { token, body: { bands: [], intervals: [1] } });
  expect((await send()).status).toBe(200);
  await db()('stations').where({ id: stationId }).update({ retired_at: new Date() });
  expect((await send()).status).toBe(401);
  await db()('stations').where({ id: stationId }).update({ retired_at: null });
  expect((await send()).status).toBe(200);
  await db()('station_tokens').where({ station_id: stationId }).update({ revoked_at: new Date() });
  expect((await send()).status).toBe(401);
  expect(await stored()).toHaveLength(2);
});

test('the monitor learns where to go on and what is missing', async () => {
  const last = async () => (await callApi('GET', '/api/v1/intervals/last', { token })).json();
  expect(await last()).toEqual({ lastStart: null, gaps: [] });
  const now = Math.floor(Date.now() / 60_000) * 60;
  const at = (minutesAgo: number) =>
    new Date((now - minutesAgo * 60) * 1000).toISOString().replace('.000', '');
  await post([interval(at(30)), interval(at(29)), interval(at(20))]);
  expect(await last()).toEqual({ lastStart: at(20), gaps: [{ from: at(28), to: at(20) }] });
});
