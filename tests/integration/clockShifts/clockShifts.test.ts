import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { readEnvelope } from '#ingest/receive/envelope';
import { receiveBatch } from '#ingest/receive/receive';
import { advanceClockShifts } from '#ingest/shiftClock/advance';
import type { ClockShift, ClockShiftPreview } from '#lib/contracts/clockShifts';
import type { LastInterval, Receipt } from '#lib/contracts/intervals';
import type { Days } from '#lib/contracts/levels';
import type { Quarantined, ReleaseOutcome } from '#lib/contracts/quarantine';
import { lastInterval } from '#lib/services/intervals/last';
import { makeDesk, sec, type Desk } from '../levels/support/desk';
import { computedRows } from '../levels/support/tables';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makePerson, makeStation } from '../support/people';

/** A monitor's clock was wrong for an episode, which is moved to its right time and put back. */
useFreshSchema();

const BANDS = [100, 125, 160];
let desk: Desk;
let operator: { session: string };
let regulator: { session: string };
let stations = 0;
let code: string;
let stationId: number;
let token: string;

beforeAll(async () => {
  desk = await makeDesk('clocks');
  operator = await makePerson(desk.networkId, ['operator']);
  regulator = await makePerson(desk.networkId, ['regulator']);
});

beforeEach(async () => {
  stations += 1;
  code = `CL-${stations}`;
  stationId = await makeStation(desk.networkId, code);
  token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
});

/** Minutes from a start on; their levels tell by `seed` and minute which they are. */
function minutes(from: string, count: number, seed: number) {
  return Array.from({ length: count }, (_, at) => ({
    start: new Date((sec(from) + at * 60) * 1000).toISOString(),
    seconds: 60,
    LAeq: 40 + ((seed * 7 + at) % 31),
    LAFmax: 60 + (at % 17),
    levels: [30 + (at % 13), null, 20 + ((seed + at) % 11)],
    flags: at % 29 === 0 ? ['overload'] : [],
  }));
}

/** What the monitor sends when our clock shows `at`. */
function post(intervals: unknown[], at: string, sentAt?: string): Promise<Receipt> {
  const envelope = readEnvelope(JSON.stringify({ bands: BANDS, sentAt, intervals }), 3);
  const station = { id: stationId, bandFraction: 3 as const, acceptsFromSec: null };
  return receiveBatch(station, envelope, new Date(at));
}

const path = (rest: string) => `/api/v1/networks/clocks/stations/${code}/clock-shifts${rest}`;

async function ask<T>(rest: string, body: Record<string, unknown>, status: number): Promise<T> {
  const response = await callApi('POST', path(rest), { ...operator, body });
  expect(response.status, await response.clone().text()).toBe(status);
  return (await response.json()) as T;
}

const work = async () => {
  while ((await advanceClockShifts()) > 0);
  await aggregateAll(async () => undefined);
};

async function make(episode: Record<string, unknown>): Promise<ClockShift> {
  const { shift } = await ask<{ shift: ClockShift }>('', { ...episode, reason: 'Clock was wrong' }, 202);
  await work();
  return shift;
}

async function reverse({ id }: ClockShift): Promise<void> {
  await ask(`/${id}/reversal`, { reason: 'It was right after all' }, 202);
  await work();
}

async function shifts(): Promise<ClockShift[]> {
  const response = await callApi('GET', path(''), regulator);
  return ((await response.json()) as { items: ClockShift[] }).items;
}

async function tables() {
  const rows = await db()('interval_levels').where({ station_id: stationId }).orderBy('starts_at');
  const latest = await db()('station_latest').where({ station_id: stationId });
  const shifted = await db()('clock_shift_starts').where({ station_id: stationId });
  return { rows, latest, shifted, ...(await computedRows(stationId)) };
}

const startsOf = async () => {
  const rows: number[] = await db()('interval_levels')
    .where({ station_id: stationId })
    .orderBy('starts_at')
    .pluck('starts_at');
  return rows.map((start) => new Date(start * 1000).toISOString().slice(5, 16));
};

const last = async () => {
  const response = await callApi('GET', '/api/v1/intervals/last', { token });
  return (await response.json()) as LastInterval;
};

describe('a slow clock', () => {
  /** It fell back an hour when it was 11:00, and was set right at 15:00. */
  const EPISODE = {
    from: '2026-03-03T10:00:00Z',
    to: '2026-03-03T14:00:00Z',
    shiftSeconds: 3600,
    receivedFrom: '2026-03-03T11:00:30Z',
  };
  const before = minutes('2026-03-03T06:00:00Z', 300, 1);
  const wrong = minutes('2026-03-03T10:00:00Z', 240, 2);
  const after = minutes('2026-03-03T15:00:00Z', 60, 3);

  beforeEach(async () => {
    await post(before, '2026-03-03T11:00:05Z');
    const receipt = await post(wrong.slice(0, 60), '2026-03-03T12:00:05Z', '2026-03-03T11:00:05Z');
    expect(receipt.refused).toHaveLength(60);
    expect((await post(wrong.slice(60, 200), '2026-03-03T15:00:05Z')).accepted).toBe(140);
    await post(after, '2026-03-03T16:00:05Z');
    await aggregateAll(async () => undefined);
  });

  test('moves as previewed, and back row for row', async () => {
    const found = await tables();
    const preview = await ask<ClockShiftPreview>('/preview', EPISODE, 200);
    expect(preview).toMatchObject({ intervals: 140, collisions: { count: 0 }, quarterHours: 14 });
    const shift = await make(EPISODE);
    expect(await shifts()).toMatchObject([{ id: shift.id, state: 'moved', movedCount: 140 }]);
    const starts = await startsOf();
    expect(starts).toContain('03-03T10:59');
    expect(starts).not.toContain('03-03T11:00');
    expect(starts).toContain('03-03T12:00');
    const { days } = await desk.read<Days>(code, 'days', { from: '2026-03-03', to: '2026-03-04' });
    expect(preview.dates.map(({ date }) => date)).toContain('2026-03-03');
    const then = preview.dates.find(({ date }) => date === '2026-03-03')?.after;
    expect(then?.Lday).toBeCloseTo(days[0]?.Lday ?? 0, 8);
    expect(then?.validSeconds).toBe(days[0]?.seconds.valid);
    await reverse(shift);
    expect(await tables()).toEqual(found);
    expect(await shifts()).toMatchObject([{ state: 'reversed', movedCount: 0, asideCount: 0 }]);
    expect(await findAuditBreak()).toBeNull();
    const acts = await db()('audit_log').where('action', 'like', 'clock-shift.%').pluck('action');
    expect(acts).toEqual(['clock-shift.make', 'clock-shift.reverse']);
  });

  test('what is sent again is known, what comes late is put right, and what was refused can be released', async () => {
    const found = await tables();
    const shift = await make(EPISODE);
    const again = await post([...before, ...wrong.slice(60, 200), ...after], '2026-03-04T00:00:00Z');
    expect(again).toMatchObject({ accepted: 0, known: 500, refused: [] });
    const late = await post(wrong.slice(200), '2026-03-04T00:00:00Z');
    expect(late).toMatchObject({ accepted: 40, known: 0, refused: [] });
    expect((await post(wrong.slice(200), '2026-03-04T00:00:10Z')).known).toBe(40);
    const response = await callApi(
      'GET',
      `/api/v1/networks/clocks/quarantine?station=${code}&limit=100`,
      operator,
    );
    const { items } = (await response.json()) as { items: Quarantined[] };
    const released = await callApi('POST', '/api/v1/networks/clocks/quarantine/releases', {
      ...operator,
      body: { ids: items.map(({ id }) => id), reason: 'The clock is put right' },
    });
    const { outcome } = (await released.json()) as { outcome: ReleaseOutcome };
    expect(outcome).toMatchObject({ released: 60, refusedCount: 0 });
    const starts = await startsOf();
    expect(starts).toHaveLength(600);
    expect(new Set(starts).size).toBe(600);
    expect([starts[300], starts[539]]).toEqual(['03-03T11:00', '03-03T14:59']);
    // All that was only taken because of the shift goes where it would have been without it.
    await reverse(shift);
    const { rows } = await tables();
    const late40 = rows.filter(
      ({ starts_at }) => starts_at >= sec('2026-03-03T13:20:00Z') && starts_at < sec('2026-03-03T14:00:00Z'),
    );
    expect(late40).toHaveLength(40);
    expect(rows.filter((row) => !late40.includes(row))).toEqual(found.rows);
    expect(await shifts()).toMatchObject([{ asideCount: 60 }]);
  });

  test('a gap is told in the time of the monitor, too', async () => {
    await make(EPISODE);
    expect(await lastInterval(stationId, sec('2026-03-04T00:00:00Z'))).toEqual({
      lastStart: '2026-03-03T15:59:00Z',
      gaps: [
        { from: '2026-03-03T11:00:00Z', to: '2026-03-03T12:00:00Z' },
        { from: '2026-03-03T10:00:00Z', to: '2026-03-03T11:00:00Z' },
        { from: '2026-03-03T14:20:00Z', to: '2026-03-03T15:00:00Z' },
        { from: '2026-03-03T13:20:00Z', to: '2026-03-03T14:00:00Z' },
      ],
    });
  });

  test('nothing moves while any would meet one that stays', async () => {
    const found = await tables();
    const asked = { ...EPISODE, shiftSeconds: 7200 };
    const preview = await ask<ClockShiftPreview>('/preview', asked, 200);
    expect(preview.collisions.count).toBe(20);
    expect(preview.collisions.starts[0]).toBe('2026-03-03T13:00:00Z');
    await ask('', { ...asked, reason: 'Guess' }, 422);
    await ask('', { ...EPISODE, to: '2099-01-01T00:00:00Z', reason: 'Guess' }, 422);
    await ask(
      '',
      { ...EPISODE, from: '2026-03-03T00:00:00Z', to: '2026-03-03T01:00:00Z', reason: 'None' },
      422,
    );
    expect(await tables()).toEqual(found);
    const answer = await callApi('POST', path(''), { ...regulator, body: { ...EPISODE, reason: 'x' } });
    expect(answer.status).toBe(403);
  });

  test('posts of the time that is being moved wait; others do not', async () => {
    await ask('', { ...EPISODE, reason: 'Clock was wrong' }, 202);
    const body = { bands: BANDS, intervals: wrong.slice(0, 2) };
    const waiting = await callApi('POST', '/api/v1/intervals', { token, body });
    expect(waiting.status).toBe(503);
    expect(waiting.headers.get('retry-after')).toBe('20');
    expect((await post(minutes('2026-03-03T20:00:00Z', 2, 4), '2026-03-04T00:00:00Z')).accepted).toBe(2);
    await work();
    expect((await callApi('POST', '/api/v1/intervals', { token, body })).status).toBe(200);
  });
});

describe('a fast clock', () => {
  /** It jumped an hour ahead when it was 9:00, and was put back at 13:00: from 13:00 to 14:00 its times came twice. */
  const EPISODE = { from: '2026-03-05T10:00:00Z', to: '2026-03-05T14:00:00Z', shiftSeconds: -3600 };
  const wrong = minutes('2026-03-05T10:00:00Z', 240, 5);
  const right = minutes('2026-03-05T13:00:00Z', 90, 6);

  test('the times that came twice are told apart', async () => {
    await post(minutes('2026-03-05T08:00:00Z', 60, 4), '2026-03-05T09:00:05Z');
    await post(wrong, '2026-03-05T14:00:05Z');
    const receipt = await post(right.slice(0, 60), '2026-03-05T14:00:06Z');
    expect(receipt.refused).toHaveLength(60);
    await aggregateAll(async () => undefined);
    const found = await tables();
    const shift = await make(EPISODE);
    expect(await last()).toMatchObject({ lastStart: '2026-03-05T12:59:00Z', gaps: [] });
    expect(await post(right, '2026-03-05T15:00:00Z')).toMatchObject({ accepted: 90, known: 0, refused: [] });
    const all = await post([...wrong, ...right], '2026-03-05T15:00:01Z');
    expect(all).toMatchObject({ accepted: 0, known: 330, refused: [] });
    expect(await startsOf()).toHaveLength(60 + 240 + 90);
    await reverse(shift);
    const { rows } = await tables();
    expect(rows.filter(({ starts_at }) => starts_at < sec('2026-03-05T14:00:00Z'))).toEqual(found.rows);
    expect(await shifts()).toMatchObject([{ state: 'reversed', asideCount: 60 }]);
  });

  test('a drifting clock is put right by episodes that follow one another', async () => {
    await post(minutes('2026-03-06T00:00:00Z', 240, 7), '2026-03-06T04:00:05Z');
    const early = { from: '2026-03-06T02:00:00Z', to: '2026-03-06T04:00:00Z', shiftSeconds: 60 };
    const first = await make({ ...early, shiftSeconds: 120 });
    await make({ from: '2026-03-06T00:00:00Z', to: '2026-03-06T02:00:00Z', shiftSeconds: 60 });
    await ask('', { ...early, reason: 'Overlaps an episode' }, 422);
    const starts = await startsOf();
    expect([starts[0], starts[119], starts[120], starts.at(-1)]).toEqual([
      '03-06T00:01',
      '03-06T02:00',
      '03-06T02:02',
      '03-06T04:01',
    ]);
    expect((await post(minutes('2026-03-06T00:00:00Z', 240, 7), '2026-03-06T05:00:05Z')).known).toBe(240);
    await reverse(first);
    expect((await shifts()).map(({ state }) => state)).toEqual(['moved', 'reversed']);
  });
});
