import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { updateStation } from '#db/queries/stations';
import type { Quarantined, ReleaseOutcome, SettledOutcome } from '#lib/contracts/quarantine';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const BASE = '/api/v1/networks/quay/quarantine';
const sessions = { operator: '', regulator: '', stranger: '' };
let networkId: number;
let stationId: number;
let code: string;
let token: string;
let stations = 0;

beforeAll(async () => {
  networkId = await makeNetwork('quay');
  const elsewhere = await makeNetwork('elsewhere');
  sessions.operator = (await makePerson(networkId, ['operator'])).session;
  sessions.regulator = (await makePerson(networkId, ['regulator'])).session;
  sessions.stranger = (await makePerson(elsewhere, ['operator'])).session;
});

beforeEach(async () => {
  stations += 1;
  code = `QY-${stations}`;
  stationId = await makeStation(networkId, code);
  token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
});

const interval = (minute: number, LAeq = 50) => ({
  start: new Date(Date.UTC(2026, 2, 1, 0, minute)).toISOString(),
  seconds: 60,
  LAeq,
  LAFmax: LAeq + 9,
  levels: [LAeq - 5, null, LAeq - 8],
  flags: ['rain'],
  windSpeed: 2.31,
});

async function post(intervals: unknown[]) {
  const answer = await callApi('POST', '/api/v1/intervals', {
    token,
    body: { bands: [100, 125, 160], intervals },
  });
  return (await answer.json()) as { accepted: number; refused: { code: string }[] };
}

const list = async (query = '') => {
  const answer = await callApi('GET', `${BASE}?station=${code}${query}`, { session: sessions.operator });
  return ((await answer.json()) as { items: Quarantined[] }).items;
};

async function act<T>(what: string, body: Record<string, unknown>): Promise<T> {
  const answer = await callApi('POST', `${BASE}/${what}`, { session: sessions.operator, body });
  expect(answer.status, await answer.clone().text()).toBe(200);
  return ((await answer.json()) as { outcome: T }).outcome;
}

const acceptFrom = (sec: number | null) =>
  inTransaction((transaction) => updateStation(stationId, { acceptsFromSec: sec }, transaction));
const stored = () =>
  db()('interval_levels').where({ station_id: stationId }).orderBy('starts_at').select('*');
const marks = () =>
  db()('dirty_marks').where({ station_id: stationId }).distinct().pluck('quarter_starts_at');

describe('the list', () => {
  test('has each refused record once with its reason, by station, code, state and time, in pages', async () => {
    await post([interval(0), interval(1)]);
    await post([interval(0, 60), interval(1, 61), { start: 'yesterday' }]);
    await post([interval(0, 60)]);
    const items = await list();
    expect(items.map((item) => [item.code, item.timesReceived, item.state])).toEqual([
      ['malformed', 1, 'open'],
      ['conflict', 1, 'open'],
      ['conflict', 2, 'open'],
    ]);
    expect(items[0]?.start).toBeNull();
    expect(await list('&code=conflict&from=2026-03-01T00:01:00Z')).toHaveLength(1);
    expect(await list('&state=dismissed')).toEqual([]);
    const first = await callApi('GET', `${BASE}?station=${code}&limit=2`, { session: sessions.operator });
    const { next } = (await first.json()) as { next: string };
    expect(await list(`&limit=2&cursor=${next}`)).toHaveLength(1);
  });

  test('gives the raw record, and nothing to another network’s people', async () => {
    await post([{ ...interval(0), seconds: 0, extra: 'kept' }]);
    const [item] = await list();
    const path = `${BASE}/${item?.id}`;
    const answer = await callApi('GET', path, { session: sessions.regulator });
    expect(await answer.json()).toMatchObject({
      record: { record: { bands: [100, 125, 160], interval: { seconds: 0, extra: 'kept' } } },
    });
    expect((await callApi('GET', path, { session: sessions.stranger })).status).toBe(404);
    expect(
      (await callApi('GET', path.replace('quay', 'elsewhere'), { session: sessions.stranger })).status,
    ).toBe(404);
  });

  test('is acted on by operators only', async () => {
    for (const what of ['releases', 'dismissals', 'reopenings']) {
      const body = { ids: [1], reason: 'because' };
      expect((await callApi('POST', `${BASE}/${what}`, { session: sessions.regulator, body })).status).toBe(
        403,
      );
      expect((await callApi('POST', `${BASE}/${what}`, { session: sessions.stranger, body })).status).toBe(
        404,
      );
    }
  });
});

describe('releasing', () => {
  test('stores what the moved bound lets in, as received then, with marks', async () => {
    await acceptFrom(Date.UTC(2026, 2, 2) / 1000);
    await post([interval(0), interval(20), interval(20)]);
    expect(await stored()).toHaveLength(0);
    const firstTry = await act<ReleaseOutcome>('releases', { filter: { station: code } });
    expect(firstTry).toMatchObject({ released: 0, refusedCount: 2, refused: [{ code: 'too-old' }, {}] });
    await acceptFrom(null);
    const outcome = await act<ReleaseOutcome>('releases', { filter: { station: code, code: 'too-old' } });
    expect(outcome).toMatchObject({ released: 2, known: 0, refusedCount: 0, passedOver: 0 });
    const rows = await stored();
    expect(rows).toMatchObject([{ laeq_centi_db: 5000, wind_speed_centi_ms: 231 }, {}]);
    expect((await marks()).map((sec) => (sec - Date.UTC(2026, 2, 1) / 1000) / 900).sort()).toEqual([0, 1]);
    expect(await list()).toEqual([]);
    expect(await list('&state=released')).toMatchObject([{}, { settled: { reason: null } }]);
    const again = await act<ReleaseOutcome>('releases', {
      ids: (await list('&state=released')).map(({ id }) => id),
    });
    expect(again).toMatchObject({ released: 0, passedOver: 2 });
  });

  test('says why a record stays refused, and takes one that says what is stored as known', async () => {
    await acceptFrom(Date.UTC(2026, 2, 2) / 1000);
    await post([interval(0), interval(1), { ...interval(2), LAeq: 500 }]);
    await acceptFrom(null);
    await post([interval(0), interval(1, 70)]);
    const outcome = await act<ReleaseOutcome>('releases', { filter: { station: code } });
    expect(outcome).toMatchObject({ released: 0, known: 1, refusedCount: 2 });
    expect(outcome.refused.map((one) => one.code).sort()).toEqual(['conflict', 'out-of-range']);
  });

  test('of one in a stored one’s place keeps that one, and puts it back to the byte', async () => {
    await post([interval(0), interval(1)]);
    await post([interval(1, 60)]);
    const before = await stored();
    const [conflict] = await list();
    const ids = [conflict?.id];
    expect(await act<ReleaseOutcome>('releases', { ids })).toMatchObject({ released: 0, refusedCount: 1 });
    const refused = await callApi('POST', `${BASE}/releases`, {
      session: sessions.operator,
      body: { ids, replace: true },
    });
    expect(refused.status).toBe(422);
    await db()('dirty_marks').where({ station_id: stationId }).delete();
    const done = await act<ReleaseOutcome>('releases', { ids, replace: true, reason: 'The card is right.' });
    expect(done).toMatchObject({ released: 1, refusedCount: 0 });
    expect((await stored())[1]).toMatchObject({ laeq_centi_db: 6000 });
    expect(await marks()).toHaveLength(1);
    expect(await db()('station_latest').where({ station_id: stationId }).first()).toMatchObject({
      laeq_centi_db: 6000,
    });
    const [superseded] = await list('&state=superseded');
    expect(superseded).toMatchObject({ code: 'superseded', settled: { reason: 'The card is right.' } });
    await act('releases', { ids: [superseded?.id], replace: true, reason: 'It was not.' });
    expect(await stored()).toEqual(before);
    expect(await db()('station_latest').where({ station_id: stationId }).first()).toMatchObject({
      laeq_centi_db: 5000,
    });
    expect(await list('&state=superseded')).toHaveLength(1);
  });

  test('does not replace what a longer record would overlap', async () => {
    await post([interval(0), interval(1)]);
    await post([{ ...interval(0), seconds: 120 }]);
    const before = await stored();
    const [conflict] = await list();
    const outcome = await act<ReleaseOutcome>('releases', {
      ids: [conflict?.id],
      replace: true,
      reason: 'x',
    });
    expect(outcome).toMatchObject({ released: 0, refused: [{ code: 'overlap' }] });
    expect(await stored()).toEqual(before);
    expect(await list('&state=superseded')).toEqual([]);
  });
});

describe('dismissing', () => {
  test('needs a reason, settles by filter, and can be undone', async () => {
    await post([{ start: 1 }, { start: 2 }, { ...interval(0), LAeq: 999 }]);
    const without = await callApi('POST', `${BASE}/dismissals`, {
      session: sessions.operator,
      body: { filter: { station: code } },
    });
    expect(without.status).toBe(422);
    const filter = { station: code, code: 'malformed' };
    expect(await act<SettledOutcome>('dismissals', { filter, reason: 'A test rig.' })).toEqual({
      settled: 2,
      passedOver: 0,
      isMoreLeft: false,
    });
    expect(await list()).toHaveLength(1);
    const [dismissed] = await list('&state=dismissed');
    expect(dismissed).toMatchObject({ settled: { reason: 'A test rig.' } });
    expect(await act<ReleaseOutcome>('releases', { ids: [dismissed?.id] })).toMatchObject({ passedOver: 1 });
    await act('reopenings', { ids: [dismissed?.id] });
    expect(await list()).toHaveLength(2);
    expect(await findAuditBreak()).toBeNull();
    const actions = await db()('audit_log')
      .where({ subject: `station ${code}` })
      .orderBy('id')
      .pluck('action');
    expect(actions).toEqual(['quarantine.dismiss', 'quarantine.reopen']);
  });
});
