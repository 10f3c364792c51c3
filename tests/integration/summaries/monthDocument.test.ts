import { beforeAll, describe, expect, test } from 'vitest';
import { bandSetOf } from '#db/queries/bandSets';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { insertIntervals } from '#db/queries/intervals';
import { findNetworkBySlug, type NetworkRow } from '#db/queries/networks';
import { monthDocumentSchema, type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import { computeMonth } from '#lib/services/summaries/document/computeMonth';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { quartersTouching } from '#lib/time/quarters';
import { at } from '../complaints/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

/** October 2025: the clock is put back on the 26th. */
const MONTH = '2025-10';
const AS_OF = new Date('2025-11-08T06:00:00Z');
const FROM = at('2025-09-30T23:00:00Z');
const TO = at('2025-11-01T07:00:00Z');
const FLAG_TAMPER = 1 << 6;

let network: NetworkRow;
let doc: MonthDocument;
const station = (code: string): DocumentStation => {
  const found = doc.stations.find((one) => one.code === code);
  if (!found) throw new Error(`The document has no ${code}.`);
  return found;
};

/** 60 dB from 7 to 19 UTC, 50 dB else. */
const steady = (startSec: number) => {
  const hour = new Date(startSec * 1000).getUTCHours();
  return { laeqCentiDb: hour >= 7 && hour < 19 ? 6000 : 5000 };
};

beforeAll(async () => {
  const id = await makeNetwork('merrow');
  const { userId } = await makePerson(id, ['operator']);
  const whole = await makeStation(id, 'MER-01');
  const silent = await makeStation(id, 'MER-02');
  const added = await makeStation(id, 'MER-03');
  const changed = await makeStation(id, 'MER-04');
  await makeStation(id, 'MER-05');
  await db()('stations')
    .whereIn('id', [whole, silent, changed])
    .update({ created_at: new Date('2025-09-01T00:00:00Z') });
  await db()('stations')
    .where({ id: added })
    .update({ created_at: new Date('2025-10-16T11:00:00Z') });
  await db()('stations')
    .where({ code: 'MER-05' })
    .update({ created_at: new Date('2025-11-05T00:00:00Z') });
  await store(whole, { fromSec: FROM, toSec: TO }, 300, (startSec) =>
    // An hour that somebody tampered in, at 90 dB: left out, and told.
    startSec >= at('2025-10-10T10:00:00Z') && startSec < at('2025-10-10T11:00:00Z')
      ? { laeqCentiDb: 9000, flags: FLAG_TAMPER }
      : steady(startSec),
  );
  await store(added, { fromSec: at('2025-10-16T11:00:00Z'), toSec: TO }, 300, steady);
  const middle = at('2025-10-15T12:00:00Z');
  await store(changed, { fromSec: FROM, toSec: middle }, 300, steady);
  await store(changed, { fromSec: middle, toSec: at('2025-10-17T12:00:00Z') }, 60, steady);
  await db()('exclusions').insert({
    network_id: id,
    station_id: whole,
    starts_at: at('2025-10-12T08:00:00Z'),
    ends_at: at('2025-10-12T10:00:00Z'),
    reason: 'Mowing',
    created_by: userId,
    created_at: new Date(),
  });
  await aggregateAll(async () => undefined);
  network = (await findNetworkBySlug('merrow')) as NetworkRow;
  doc = await computeMonth(network, MONTH, AS_OF);
});

/** Stores a station’s intervals of some length as if received, marked to be recomputed. */
async function store(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  durationSec: number,
  levelAt: (startSec: number) => { laeqCentiDb: number; flags?: number },
): Promise<void> {
  const { id: bandSetId } = await bandSetOf(3, [-1, 0, 1]);
  const count = Math.floor((toSec - fromSec) / durationSec);
  const intervals = Array.from({ length: count }, (_, index) => {
    const startSec = fromSec + index * durationSec;
    const { laeqCentiDb, flags = 0 } = levelAt(startSec);
    return {
      ...{ startSec, durationSec, laeqCentiDb, lafmaxCentiDb: laeqCentiDb + 900, lafminCentiDb: null },
      ...{
        lceqCentiDb: null,
        lcpeakCentiDb: null,
        bandSetId,
        levelsCentiDb: Int16Array.of(4000, 4100, 4000),
      },
      ...{ flags, windSpeedMs: null, windDirectionDeg: null, temperatureC: null, batteryV: null },
      receivedAtSec: startSec + durationSec,
    };
  });
  await inTransaction(async (transaction) => {
    await insertIntervals(stationId, intervals, transaction);
    await insertDirtyMarks(stationId, quartersTouching(fromSec, toSec), transaction);
  });
}

test('is of its form; who came after the month is not in it, who was silent is', () => {
  expect(monthDocumentSchema.parse(doc)).toEqual(doc);
  expect(doc.stations.map(({ code }) => code)).toEqual(['MER-01', 'MER-02', 'MER-03', 'MER-04']);
});

describe('a month with a clock change', () => {
  test('has 25 hours on its date, one of them twice, and 745 in all', () => {
    const { hours, days, figures } = station('MER-01');
    const date = '2025-10-26';
    expect(hours).toHaveLength(745);
    expect(hours.filter((hour) => hour.date === date && hour.hour === 1).map(({ turn }) => turn)).toEqual([
      0, 1,
    ]);
    expect(days.find((day) => day.date === date)).toMatchObject({ hours: 25 });
    expect(days.find((day) => day.date === '2025-10-25')?.Lnight).toBe(50);
    expect(figures.seconds.expected).toBe(745 * 3600);
    expect(station('MER-01').spectrogram).toMatchObject({ columns: 745, columnSeconds: 3600 });
  });

  test('its levels are those of what was measured, the tampered and the excluded hours left out', () => {
    const { figures, exclusions } = station('MER-01');
    expect(figures.LAFmax).toBe(69);
    expect(figures.seconds.excluded).toBe(3 * 3600);
    expect(exclusions.items).toEqual([
      { from: '2025-10-12T08:00:00Z', to: '2025-10-12T10:00:00Z', reason: 'Mowing' },
    ]);
    expect(exclusions.leftOut).toEqual([
      { reason: 'tamper', seconds: 3600 },
      { reason: 'exclusion', seconds: 7200 },
    ]);
    const effect = exclusions.figures.find(({ quantity }) => quantity === 'LAeq');
    const energy = (db: number) => 10 ** (db / 10);
    const seconds = 745 * 3600;
    // 31 days of 12 h at 60 dB, an hour of which was at 90 dB, the rest at 50 dB.
    const all = (energy(60) * 371 * 3600 + energy(90) * 3600 + energy(50) * (seconds - 372 * 3600)) / seconds;
    expect(effect?.all).toBeCloseTo(10 * Math.log10(all), 6);
    expect(effect?.difference).toBeCloseTo((figures.LAeq ?? 0) - 10 * Math.log10(all), 6);
  });
});

test('a station without data: every level null, nothing covered, no statement about tones', () => {
  const silent = station('MER-02');
  expect(silent.figures).toMatchObject({
    LAeq: null,
    Lden: null,
    LA90: null,
    coverage: 0,
    meetsMinimum: false,
  });
  expect(silent.yearToDate.Lden).toBeNull();
  expect(silent.days).toHaveLength(31);
  expect(silent.spectrogram).toBeNull();
  expect(silent.tonality).toMatchObject({ notAssessable: 'no-data', assessedBlocks: 0 });
  expect(silent.exclusions.figures.every(({ valid, all }) => valid === null && all === null)).toBe(true);
});

test('a station added within the month: coverage of the whole month, and since its registration beside it', () => {
  const { figures, coverageSinceRegistration, days, standsFrom } = station('MER-03');
  expect(standsFrom).toBe('2025-10-16T11:00:00.000Z');
  expect(coverageSinceRegistration).toBe(1);
  const valid = at('2025-11-01T00:00:00Z') - at('2025-10-16T11:00:00Z');
  expect(figures.seconds).toEqual({ expected: 745 * 3600, valid, excluded: 0 });
  expect(figures.meetsMinimum).toBe(false);
  expect(days[0]).toMatchObject({ Lday: null, Lden: null, coverage: 0 });
  expect(days.find(({ date }) => date === '2025-10-17')).toMatchObject({ coverage: 1, Lnight: 50 });
});

test('intervals of another length from the middle on: energies pool, statistical levels of the month are none', () => {
  const { figures, days, tonality } = station('MER-04');
  expect(figures.sampleSeconds).toBeNull();
  expect([figures.LA10, figures.LA50, figures.LA90]).toEqual([null, null, null]);
  expect(figures.LAeq).toBeGreaterThan(50);
  expect(days.find(({ date }) => date === '2025-10-14')).toMatchObject({ sampleSeconds: 300, LA90: 50 });
  expect(days.find(({ date }) => date === '2025-10-15')).toMatchObject({ sampleSeconds: null, LA90: null });
  expect(days.find(({ date }) => date === '2025-10-16')).toMatchObject({ sampleSeconds: 60, LA90: 50 });
  expect(tonality.assessedBlocks).toBeGreaterThan(0);
});

test('progress is told station by station, and a month to come is refused', async () => {
  const told: [number, number][] = [];
  const again = await computeMonth(network, MONTH, AS_OF, {
    onProgress: (done, of) => told.push([done, of]),
  });
  expect(again).toEqual(doc);
  expect(told).toEqual([
    [1, 5],
    [2, 5],
    [3, 5],
    [4, 5],
    [5, 5],
  ]);
  await expect(computeMonth(network, '2025-12', AS_OF)).rejects.toThrow('has not begun');
});
