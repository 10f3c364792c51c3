import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { listCounted } from '#db/queries/complaintCounts';
import { complaintCalendar } from '#lib/services/complaints/calendar';
import { compareMeasure } from '#lib/services/complaints/compareMeasure';
import { mergeCase } from '#lib/services/complaints/desk/merge';
import { lift, makeExceedance, makeLimit } from '../exceedances/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { logAt, makeDesk, type Desk } from './deskSupport';
import { at, storeMinutes } from './support';

useFreshSchema();

const NOW_SEC = at('2026-06-01T12:00:00Z');
let desk: Desk;
let nearId: number;
let loudId: number;

/** A complaint of half an hour, by its beginning. */
const logFrom = (from: string, change: Record<string, unknown> = {}) =>
  logAt(desk, { from, to: new Date(Date.parse(from) + 1_800_000).toISOString(), ...change });

beforeAll(async () => {
  desk = await makeDesk();
  nearId = desk.stationId;
  loudId = await makeStation(desk.network.id, 'MER-05', { latitude: 54.2, longitude: 1.6 });
});

describe('what is counted', () => {
  let limit: Awaited<ReturnType<typeof makeLimit>>;
  const exceed = (startSec: number, stationId = nearId) =>
    makeExceedance({ networkId: desk.network.id, stationId, limit, startSec, levelDb: 60 });
  const countedOn = async (date: string) =>
    listCounted(desk.network.id, {
      fromSec: at(`${date}T00:00:00Z`),
      toSec: at(`${date}T00:00:00Z`) + 86_400,
    });

  beforeAll(async () => {
    limit = await makeLimit(desk.network.id, 'Night');
  });

  test.each([
    ['overlapping, at the nearest station', '2026-01-05', '02:20', 'near', false, true],
    ['ending when the noise began', '2026-01-06', '02:10', 'near', false, false],
    ['beginning when the noise ended', '2026-01-07', '03:40', 'near', false, false],
    ['at another station', '2026-01-08', '03:00', 'loud', false, false],
    ['lifted since', '2026-01-09', '03:00', 'near', true, false],
  ])('an exceedance %s', async (_, date, startsAt, where, isLifted, expected) => {
    const complaint = await logFrom(`${date}T03:10:00Z`);
    const id = await exceed(at(`${date}T${startsAt}:00Z`), where === 'near' ? nearId : loudId);
    if (isLifted) await lift(id, { levelDb: 50, coverage: 1 });
    const rows = await countedOn(date);
    expect(rows).toHaveLength(1);
    expect(rows[0]).toMatchObject({
      startsAtSec: complaint.startsAtSec,
      hasExceedance: expected,
      stationCode: 'MER-04',
      kind: 'hum',
    });
  });

  test('begins within the period, its end left out, in this network only', async () => {
    const [first, atEnd] = ['2026-01-12T00:00:00Z', '2026-01-13T00:00:00Z'];
    await logFrom(first);
    await logFrom(atEnd);
    await logFrom('2026-01-11T23:45:00Z');
    expect((await countedOn('2026-01-12')).map(({ startsAtSec }) => startsAtSec)).toEqual([at(first)]);
    const another = await db()('networks').where({ slug: 'farther' }).first('id');
    expect(await listCounted(another.id, { fromSec: 0, toSec: NOW_SEC })).toEqual([]);
  });

  test('is due when it was first due, though the date moved', async () => {
    const complaint = await logFrom('2026-01-14T10:00:00Z');
    await db()('complaints')
      .where({ id: complaint.id })
      .update({ first_due_on: '2026-01-28', due_on: '2026-02-11' });
    expect((await countedOn('2026-01-14'))[0]?.firstDueOn).toBe('2026-01-28');
    await db()('complaints').where({ id: complaint.id }).update({ first_due_on: null });
    expect((await countedOn('2026-01-14'))[0]?.firstDueOn).toBe('2026-02-11');
  });
});

describe('before and after a measure', () => {
  const compare = (days: number, now: string, kind: 'bang' | 'whine' = 'bang') =>
    compareMeasure(
      { networkId: desk.network.id, timeZone: 'Europe/London', kind },
      '2026-04-01',
      days,
      at(now),
    );

  beforeAll(async () => {
    // Local midnight of the measure's date is 23:00 UTC of the date before.
    for (const instant of ['2026-03-31T22:59:00Z', '2026-03-31T23:00:00Z', '2026-04-01T09:00:00Z']) {
      await logFrom(instant, { kind: 'bang' });
    }
    for (const day of ['10', '11', '12', '13']) await logFrom(`2026-03-${day}T09:00:00Z`, { kind: 'bang' });
    const [first, again] = [
      await logFrom('2026-03-20T09:00:00Z', { kind: 'whine' }),
      await logFrom('2026-03-20T09:10:00Z', { kind: 'whine' }),
    ];
    await mergeCase(
      { userId: desk.liaison.userId, network: desk.network, reference: again.reference },
      first.reference,
    );
  });

  test('counts equal spans of civil dates, split at local midnight', async () => {
    expect(await compare(28, '2026-05-01T12:00:00Z')).toEqual({
      measureOn: '2026-04-01',
      days: 28,
      isShortened: false,
      before: { from: '2026-03-04', to: '2026-04-01', total: 5, dates: 5, withExceedance: 0 },
      after: { from: '2026-04-01', to: '2026-04-29', total: 2, dates: 1, withExceedance: 0 },
      // Of seven even throws at most two on one side: 2 · (1 + 7 + 21) / 2⁷.
      chance: expect.closeTo(58 / 128, 12),
    });
  });

  test('is shortened to the whole dates that have passed on both sides', async () => {
    const found = await compare(28, '2026-04-06T22:59:00Z');
    expect(found).toMatchObject({
      days: 5,
      isShortened: true,
      before: { from: '2026-03-27', total: 1 },
      after: { to: '2026-04-06', total: 2 },
    });
    expect(await compare(28, '2026-04-06T23:00:00Z')).toMatchObject({ days: 6 });
  });

  test.each(['2026-04-01T22:59:00Z', '2026-03-30T12:00:00Z'])('is nothing yet at %s', async (now) => {
    expect(await compare(28, now)).toBeNull();
  });

  test('leaves repeats out', async () => {
    expect(await compare(28, '2026-05-01T12:00:00Z', 'whine')).toMatchObject({
      before: { total: 1, dates: 1 },
      after: { total: 0 },
      chance: 1,
    });
  });
});

describe('calendar', () => {
  const calendar = async (fromDate: string, toDate: string, station: string | null = null) => {
    const dates = await complaintCalendar({
      network: desk.network,
      fromDate,
      toDate,
      station,
      nowSec: NOW_SEC,
    });
    return Object.fromEntries(dates.map((one) => [one.date, one]));
  };

  beforeAll(async () => {
    const limit = await makeLimit(desk.network.id, 'Day');
    const level = (laeqCentiDb: number) => () => ({ laeqCentiDb });
    const shared = { networkId: desk.network.id, limit, levelDb: 60 };
    await logFrom('2026-02-11T03:10:00Z');
    await logFrom('2026-02-11T10:00:00Z', { station: 'MER-05' });
    const again = await logFrom('2026-02-11T03:20:00Z');
    const act = { userId: desk.liaison.userId, network: desk.network, reference: again.reference };
    const first = await logFrom('2026-02-11T03:30:00Z');
    await mergeCase(act, first.reference);
    // Across seven in the morning, where one date ends and the next begins.
    await makeExceedance({ ...shared, stationId: nearId, startSec: at('2026-02-11T06:30:00Z') });
    await storeMinutes(nearId, at('2026-02-10T23:00:00Z'), at('2026-02-12T07:00:00Z'), level(4000));
    await storeMinutes(loudId, at('2026-02-10T23:00:00Z'), at('2026-02-11T07:00:00Z'), level(5000));
    // Half of the next night: too little to stand for it.
    await storeMinutes(loudId, at('2026-02-11T23:00:00Z'), at('2026-02-12T03:00:00Z'), level(7000));
  });

  test('a noise at 03:10 is of the date before, and of its night; repeats are left out', async () => {
    const dates = await calendar('2026-02-10', '2026-02-13');
    expect(Object.keys(dates)).toEqual(['2026-02-10', '2026-02-11', '2026-02-12']);
    expect(dates['2026-02-10']).toMatchObject({ complaints: 2, atNight: 2, exceedances: 1 });
    expect(dates['2026-02-11']).toMatchObject({ complaints: 1, atNight: 0, exceedances: 1 });
    expect(dates['2026-02-12']).toMatchObject({ complaints: 0, atNight: 0, exceedances: 0, night: null });
  });

  test('the loudest night is one with enough data', async () => {
    const dates = await calendar('2026-02-10', '2026-02-12');
    expect(dates['2026-02-10']?.night).toMatchObject({ station: 'MER-05', coverage: 1 });
    expect(dates['2026-02-10']?.night?.levelDb).toBeCloseTo(50, 6);
    expect(dates['2026-02-11']?.night).toMatchObject({ station: 'MER-04', coverage: 1 });
    expect(dates['2026-02-11']?.night?.levelDb).toBeCloseTo(40, 6);
  });

  test('of one station has only what is of it', async () => {
    const dates = await calendar('2026-02-10', '2026-02-12', 'MER-05');
    expect(dates['2026-02-10']).toMatchObject({
      complaints: 0,
      exceedances: 0,
      night: { station: 'MER-05' },
    });
    expect(dates['2026-02-11']).toMatchObject({ complaints: 1, exceedances: 0, night: null });
  });

  test('the date whose night the clocks go forward in has 23 hours', async () => {
    await logFrom('2026-03-29T05:59:00Z');
    await logFrom('2026-03-29T06:00:00Z');
    const dates = await calendar('2026-03-28', '2026-03-30');
    const short = dates['2026-03-28'];
    expect((short?.toSec ?? 0) - (short?.fromSec ?? 0)).toBe(23 * 3600);
    expect(short).toMatchObject({ complaints: 1, atNight: 1 });
    expect(dates['2026-03-29']).toMatchObject({ complaints: 1, atNight: 0 });
  });
});
