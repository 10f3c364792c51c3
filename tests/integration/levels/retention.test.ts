import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { insertStationToken } from '#db/queries/stationTokens';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { retainIntervals } from '#ingest/retention/retain';
import { addExclusion } from '#lib/services/exclusions/add';
import { readRatingEntry } from '#lib/services/figures/ratingForm';
import { figureSheet } from '#lib/services/figures/sheet';
import { sheetCsv } from '#lib/services/figures/sheetCsv';
import { periodStatistics } from '#lib/services/levels/statistics';
import { dayFigures } from '#lib/services/levels/days';
import { spectrogram } from '#lib/services/levels/spectrogram';
import { changeNetwork } from '#lib/services/networks/change';
import { changeRetention } from '#lib/services/retention/settings';
import { SealedError } from '#lib/services/retention/seal';
import { findStationById, type StationRow } from '#db/queries/stations';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makePerson, makeStation } from '../support/people';
import { makeDesk, sec, type Desk } from './support/desk';
import { invent, storeMeasured } from './support/measured';
import { computedRows } from './support/tables';
import { rebuildAll } from './support/rebuildAll';

/** Single intervals are kept for a while: what is computed of them stays, is told to be that, and nothing of it can be changed. */
useFreshSchema();

const nothing = async () => undefined;
/** Thirteen months later whole months before March go. */
const NOW = new Date('2026-04-02T03:00:00Z');
const SEALED_BEFORE = sec('2025-03-01T00:00:00Z');
const KEPT_FROM = SEALED_BEFORE - 2 * 86_400;
const OLD = { fromSec: sec('2025-02-24T00:00:00Z'), toSec: sec('2025-02-26T00:00:00Z') };
const RAGGED = { fromSec: sec('2025-02-24T10:07:00Z'), toSec: sec('2025-02-24T12:08:00Z') };

let desk: Desk;
let station: StationRow;
let before: Awaited<ReturnType<typeof figuresNow>>;
let rows: Awaited<ReturnType<typeof computedRows>>;

const statistics = (span: { fromSec: number; toSec: number }) =>
  periodStatistics({ station, ...span, nowSec: NOW.getTime() / 1000 });

async function figuresNow() {
  const query = { station, fromDate: '2025-02-24', toDate: '2025-03-03', nowSec: NOW.getTime() / 1000 };
  return { days: await dayFigures(query), whole: await statistics(OLD) };
}

beforeAll(async () => {
  desk = await makeDesk('kept');
  const id = await makeStation(desk.networkId, 'KEPT');
  const stretch = { fromSec: sec('2025-02-23T22:00:00Z'), toSec: sec('2025-03-03T12:00:00Z') };
  await storeMeasured(id, await invent({ ...stretch, intervalSec: 60, bands: [-16, 9], gaps: 0.01 }, 3));
  station = (await findStationById(id)) ?? (await Promise.reject(new Error('There is no station.')));
  await aggregateAll(nothing);
  before = await figuresNow();
  rows = await computedRows(id);
  await changeRetention({ networkId: desk.networkId, userId: (await makePerson(null, [], true)).userId }, 13);
}, 120_000);

const oldest = async () =>
  Number(
    (await db()('interval_levels').where({ station_id: station.id }).min({ first: 'starts_at' }).first())
      ?.first,
  );

test('a month is sealed once everything of it is computed, and its intervals go a while later', async () => {
  await inTransaction((transaction) => insertDirtyMarks(station.id, [OLD.fromSec], transaction));
  expect(await retainIntervals(NOW)).toBe(0);
  expect(await db()('sealed_stations')).toEqual([]);
  await aggregateAll(nothing);
  expect(await retainIntervals(NOW)).toBe(0);
  expect(await db()('sealed_stations')).toMatchObject([
    { sealed_before: SEALED_BEFORE, kept_from: KEPT_FROM },
  ]);
  expect(await oldest()).toBeLessThan(KEPT_FROM);
  const later = new Date(NOW.getTime() + 16 * 60_000);
  while ((await retainIntervals(later)) > 0);
  expect(await oldest()).toBeGreaterThanOrEqual(KEPT_FROM);
  expect(await retainIntervals(later)).toBe(0);
});

test('figures that reach back are those of before, and say what they are from', async () => {
  const after = await figuresNow();
  expect(after.days).toEqual(before.days);
  expect(after.whole.LAeq).toBeCloseTo(before.whole.LAeq ?? NaN, 6);
  expect(after.whole.LAN).toEqual(before.whole.LAN);
  expect(after.whole.seconds).toEqual(before.whole.seconds);
  expect(before.whole.note).toBeNull();
  expect(after.whole.note).toContain('Single intervals before 2025-02-27T00:00:00Z are no longer kept');
  expect((await statistics({ fromSec: SEALED_BEFORE, toSec: SEALED_BEFORE + 7200 })).note).toBeNull();
});

test('a period that ends within a quarter-hour is that of the quarter-hours it touches, and says so', async () => {
  const ragged = await statistics(RAGGED);
  expect([ragged.from, ragged.to]).toEqual(['2025-02-24T10:00:00Z', '2025-02-24T12:15:00Z']);
  const whole = await statistics({
    fromSec: sec('2025-02-24T10:00:00Z'),
    toSec: sec('2025-02-24T12:15:00Z'),
  });
  expect(ragged.LAeq).toBe(whole.LAeq);
  expect(ragged.bands.every(({ L50 }) => L50 === null)).toBe(true);
  expect([ragged.seconds, ragged.coverage]).toEqual([whole.seconds, whole.coverage]);
  expect(ragged.seconds.valid).toBeGreaterThan(0);
  await expect(periodStatistics({ station, ...RAGGED, validity: 'all' })).rejects.toThrow(SealedError);
});

test('the spectrogram is drawn from quarter-hours, and the figures page and its CSV say what is missing', async () => {
  const { header } = await spectrogram({ station, ...RAGGED, mostColumns: 500 });
  expect(header).toMatchObject({ source: 'quarter-hours', stepSeconds: 900 });
  const sheet = await figureSheet({
    networkSlug: 'kept',
    station,
    ...OLD,
    rating: readRatingEntry(new URLSearchParams()),
    nowSec: NOW.getTime() / 1000,
  });
  expect(sheet.intervalsMissing).toContain('no longer kept');
  expect(sheetCsv(sheet)).toContain('are no longer kept');
});

test('lists of single intervals say from when they are kept; a file that would lack some is refused', async () => {
  const from = '2025-02-26T00:00:00Z';
  const list = await desk.read<{ keptFrom: string | null; items: unknown[] }>('KEPT', 'intervals', {
    from,
    to: '2025-02-27T12:00:00Z',
  });
  expect(list.keptFrom).toBe('2025-02-27T00:00:00Z');
  expect(list.items.length).toBeGreaterThan(100);
  const { session } = await makePerson(desk.networkId, ['operator']);
  const path = '/api/v1/networks/kept/stations/KEPT/intervals.csv';
  const file = (start: string) =>
    callApi('GET', `${path}?from=${start}&to=2025-02-28T00:00:00Z`, { session });
  expect((await file(from)).status).toBe(409);
  expect((await file('2025-02-27T00:00:00Z')).status).toBe(200);
});

test('nothing before can be changed: exclusions, late data, settings that reach back', async () => {
  const { userId, session } = await makePerson(desk.networkId, ['operator']);
  const asked = { networkId: desk.networkId, stationCode: 'KEPT', ...OLD, reason: 'Mower', userId };
  await expect(addExclusion(asked)).rejects.toThrow('Figures before 2025-03-01T00:00:00Z are sealed');
  const refused = await callApi('POST', '/api/v1/networks/kept/exclusions', {
    session,
    body: { station: 'KEPT', from: '2025-02-24T00:00:00Z', to: '2025-03-02T00:00:00Z', reason: 'Mower' },
    headers: { origin: 'http://127.0.0.1:4321' },
  });
  expect(refused.status).toBe(409);
  expect(await refused.json()).toMatchObject({ code: 'sealed' });
  const network = { id: desk.networkId, slug: 'kept', name: 'Kept' };
  const settings = { effectiveFrom: OLD.fromSec, minimumCoverage: 0.5 };
  await expect(changeNetwork(network, settings, userId)).rejects.toThrow(SealedError);
  const token = await inTransaction((transaction) => insertStationToken(station.id, null, transaction));
  const late = {
    bands: [100],
    intervals: [{ start: '2025-02-24T00:00:30Z', seconds: 1, LAeq: 50, levels: [40] }],
  };
  const posted = await callApi('POST', '/api/v1/intervals', { token, body: late });
  expect(await posted.json()).toMatchObject({ accepted: 0, refused: [{ code: 'too-old' }] });
  expect((await addExclusion({ ...asked, fromSec: SEALED_BEFORE, toSec: SEALED_BEFORE + 900 }))?.reason).toBe(
    'Mower',
  );
});

test('marks and a rebuild leave what is sealed as it is', async () => {
  await inTransaction((transaction) =>
    insertDirtyMarks(station.id, [OLD.fromSec, OLD.fromSec + 900], transaction),
  );
  await aggregateAll(nothing);
  await rebuildAll(nothing);
  const now = await computedRows(station.id);
  const sealed = (all: readonly unknown[]) =>
    all.filter(
      (row) =>
        ((row as { ends_at?: number }).ends_at ?? (row as { starts_at: number }).starts_at + 900) <=
        SEALED_BEFORE,
    );
  expect(sealed(now.quarters)).toEqual(sealed(rows.quarters));
  expect(sealed(now.periods)).toEqual(sealed(rows.periods));
  expect(sealed(now.quarters).length).toBeGreaterThan(400);
  expect(await db()('dirty_marks')).toEqual([]);
});
