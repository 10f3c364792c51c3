import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findStation, type StationRow } from '#db/queries/stations';
import { selectIntervals } from '#db/queries/intervals';
import type { FigureSheet } from '#lib/contracts/figureSheet';
import type { Days, Statistics } from '#lib/contracts/levels';
import { figureSheet, isTooLong } from '#lib/services/figures/sheet';
import { readRatingEntry } from '#lib/services/figures/ratingForm';
import { sheetCsv } from '#lib/services/figures/sheetCsv';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { at, storeMinutes } from '../complaints/support';

useFreshSchema();

const STATION = '/api/v1/networks/merrow/stations/MER-01';
const CALIBRATION = 1 << 2;
const OVERLOAD = 1 << 0;
/** Two weeks around the autumn change of 2026-10-25 in London, and two around the spring change of 2026-03-29. */
const AUTUMN = { from: '2026-10-19T23:00:00Z', to: '2026-10-27T00:00:00Z' };
const SPRING = { from: '2026-03-27T00:00:00Z', to: '2026-03-30T23:00:00Z' };
let station: StationRow;
let session: string;

/** Levels that differ minute by minute in a way that repeats nowhere near an hour or a day. */
function minuteAt(startSec: number) {
  const minute = Math.floor(startSec / 60);
  const hour = Math.floor(minute / 60);
  // A gap of three hours, one of half an hour, and two kinds of intervals that do not count.
  if (hour % 61 < 3) return null;
  if (hour % 47 === 0 && minute % 60 < 30) return null;
  const flags = (minute % 211 === 0 ? CALIBRATION : 0) | (minute % 307 === 0 ? OVERLOAD : 0);
  return {
    laeqCentiDb: flags === 0 ? 4500 + ((minute * 37) % 1999) : 9400,
    flags,
    bandCentiDb: (index: number) => (index === -10 ? 6900 : 4000 + ((minute + index * index) % 300)),
  };
}

beforeAll(async () => {
  const networkId = await makeNetwork('merrow');
  const stationId = await makeStation(networkId, 'MER-01');
  const operator = await makePerson(networkId, ['operator']);
  session = operator.session;
  await storeMinutes(stationId, at(AUTUMN.from), at(AUTUMN.to), minuteAt);
  await storeMinutes(stationId, at(SPRING.from), at(SPRING.to), minuteAt);
  await db()('exclusions').insert({
    network_id: networkId,
    station_id: stationId,
    starts_at: at('2026-10-22T10:00:00Z'),
    ends_at: at('2026-10-22T11:30:00Z'),
    reason: 'Mast was moved',
    created_by: operator.userId,
    created_at: new Date(),
  });
  await aggregateAll(async () => {});
  const found = await findStation(networkId, 'MER-01');
  if (!found) throw new Error('The station was not made.');
  station = found;
});

const sheetOf = (span: { from: string; to: string }, query = ''): Promise<FigureSheet> =>
  figureSheet({
    networkSlug: 'merrow',
    station,
    fromSec: at(span.from),
    toSec: at(span.to),
    rating: readRatingEntry(new URLSearchParams(query)),
    nowSec: at('2026-11-15T00:00:00Z'),
  });

async function statisticsOf(span: { from: string; to: string }, validity = 'rules'): Promise<Statistics> {
  const path = `${STATION}/statistics?from=${span.from}&to=${span.to}&validity=${validity}`;
  const response = await callApi('GET', path, { session });
  expect(response.status).toBe(200);
  return (await response.json()) as Statistics;
}

const valueOf = (sheet: FigureSheet, key: string) =>
  [...sheet.levels, ...sheet.assessments].find((row) => row.key === key)?.value;

describe('the figures of a period', () => {
  test.each([
    ['whole days', AUTUMN],
    ['ragged ends', { from: '2026-10-21T09:07:00Z', to: '2026-10-24T17:41:00Z' }],
  ])('are those of the statistics route: %s', async (_, span) => {
    const [sheet, statistics] = [await sheetOf(span), await statisticsOf(span)];
    expect(sheet).toMatchObject({
      seconds: statistics.seconds,
      coverage: statistics.coverage,
      meetsMinimum: statistics.meetsMinimum,
    });
    for (const key of ['LAeq', 'LCeq', 'LAFmax', 'LAFmin', 'LCpeak', 'LAE'] as const) {
      expect(valueOf(sheet, key), key).toBe(statistics[key]);
    }
    for (const [percent, level] of Object.entries(statistics.LAN)) {
      expect(valueOf(sheet, `LA${percent}`), percent).toBe(level);
    }
    expect(valueOf(sheet, 'NR')).toBe(statistics.noiseRating?.NR);
    expect(sheet.bands).toMatchObject(statistics.bands);
    expect(sheet.octaves).toMatchObject(statistics.octaves);
  });

  test('say with and without what is left out, with the difference and the reasons', async () => {
    const [sheet, valid, raw] = [
      await sheetOf(AUTUMN),
      await statisticsOf(AUTUMN),
      await statisticsOf(AUTUMN, 'all'),
    ];
    const compared = sheet.comparison?.figures.find(({ key }) => key === 'LAeq');
    expect(compared?.validDb).toBe(valid.LAeq);
    expect(compared?.rawDb).toBeCloseTo(raw.LAeq ?? NaN, 9);
    expect(compared?.differenceDb).toBeCloseTo((valid.LAeq ?? NaN) - (raw.LAeq ?? NaN), 9);
    const leftOut = (await selectIntervals(station.id, at(AUTUMN.from), at(AUTUMN.to))).filter(
      ({ flags, startSec }) =>
        flags !== 0 || (startSec >= at('2026-10-22T10:00:00Z') && startSec < at('2026-10-22T11:30:00Z')),
    );
    expect(sheet.intervals?.leftOut).toBe(leftOut.length);
    expect((sheet.intervals?.leftOut ?? 0) * 60).toBe(sheet.seconds.excluded);
    expect((sheet.intervals?.counted ?? 0) * 60).toBe(sheet.seconds.valid);
    expect(sheet.intervals?.reasons.find(({ reason }) => reason === 'calibration')?.intervals).toBe(
      leftOut.filter(({ flags }) => (flags & CALIBRATION) !== 0).length,
    );
    expect(sheet.exclusions).toEqual([
      { from: '2026-10-22T10:00:00Z', to: '2026-10-22T11:30:00Z', reason: 'Mast was moved' },
    ]);
  });

  test('by date are those of the days route, with L10,18h from hourly levels', async () => {
    const sheet = await sheetOf(AUTUMN);
    const response = await callApi('GET', `${STATION}/days?from=2026-10-20&to=2026-10-27`, { session });
    const { days } = (await response.json()) as Days;
    expect(sheet.dates).toMatchObject(days);
    const hours = Array.from({ length: 18 }, (_, at) => 6 + at);
    for (const { date, L10of18h } of sheet.dates) {
      const levels = await Promise.all(
        hours.map(async (hour) => {
          const fromSec = localHourSec(date, hour);
          const span = { from: iso(fromSec), to: iso(fromSec + 3600) };
          return (await statisticsOf(span)).LAN['10'] ?? null;
        }),
      );
      const expected = levels.includes(null)
        ? null
        : levels.reduce<number>((sum, level) => sum + (level ?? NaN), 0) / 18;
      if (expected === null) expect(L10of18h, date).toBeNull();
      else expect(L10of18h, date).toBeCloseTo(expected, 9);
    }
  });

  test('find the tone on the mean spectrum and block by block', async () => {
    const { tonality } = await sheetOf(AUTUMN);
    expect(tonality.notAssessable).toBeNull();
    expect(tonality.tones.map(({ method }) => method)).toEqual(['survey', 'averaged-neighbours']);
    expect(tonality.blocks?.bands[0]).toEqual({ label: '100 Hz', share: 1 });
  });

  test('have no level where there are no data, and say why', async () => {
    const sheet = await sheetOf({ from: '2026-06-01T00:00:00Z', to: '2026-06-02T00:00:00Z' });
    expect(sheet.levels.every(({ value, missing }) => value === null && missing !== null)).toBe(true);
    expect(sheet.assessments.every(({ value, missing }) => value === null && missing !== null)).toBe(true);
    expect(sheet.byClock).toMatchObject({ Lden: null });
    expect(sheet.distribution).toBeNull();
  });

  test('add the adjustments that a person entered, and none without a reason', async () => {
    const plain = await sheetOf(AUTUMN);
    const rated = await sheetOf(AUTUMN, 'tonal=4&tonalReason=hum&impulsive=3&background=40');
    const LAeq = valueOf(plain, 'LAeq') ?? NaN;
    expect(valueOf(plain, 'LAr')).toBe(LAeq);
    expect(valueOf(rated, 'LAr')).toBeCloseTo(LAeq + 4, 9);
    expect(valueOf(rated, 'LAr-LA90')).toBeCloseTo(LAeq + 4 - 40, 9);
  });

  test('as CSV carry the same values', async () => {
    const sheet = await sheetOf(AUTUMN);
    const lines = sheetCsv(sheet).split('\r\n');
    expect(lines).toContainEqual(
      expect.stringMatching(new RegExp(`^period,,LAeq,${valueOf(sheet, 'LAeq')},dB,`)),
    );
    expect(lines.filter((line) => line.startsWith('hours,'))).toHaveLength(
      sheet.heatMap.flatMap(({ cells }) => cells).length,
    );
  });
});

describe('the heat map', () => {
  test.each([
    ['autumn, a date of 25 hours', AUTUMN],
    ['spring, a date of 23 hours', SPRING],
  ])('has the hours of the clock as the intervals give them: %s', async (_, span) => {
    const cells = (await sheetOf(span)).heatMap.flatMap((row) => row.cells);
    const naive = await naiveHours(span);
    expect(cells).toHaveLength((at(span.to) - at(span.from)) / 3600);
    for (const cell of cells) {
      const expected = naive.get(at(cell.from));
      expect(localHourOf(at(cell.from))).toEqual({ date: cell.date, hour: cell.hour });
      expect(cell.coverage).toBeCloseTo((expected?.sec ?? 0) / 3600, 9);
      if (!expected) expect(cell.LAeq).toBeNull();
      else expect(cell.LAeq).toBeCloseTo(10 * Math.log10(expected.energySec / expected.sec), 6);
    }
  });

  test('shows the repeated hour twice and the skipped one not at all', async () => {
    const autumn = (await sheetOf(AUTUMN)).heatMap.find(({ date }) => date === '2026-10-25');
    expect(autumn?.cells).toHaveLength(25);
    expect(autumn?.cells.filter(({ hour }) => hour === 1).map(({ from, turn }) => [from, turn])).toEqual([
      ['2026-10-25T00:00:00Z', 0],
      ['2026-10-25T01:00:00Z', 1],
    ]);
    const spring = (await sheetOf(SPRING)).heatMap.find(({ date }) => date === '2026-03-29');
    expect(spring?.cells).toHaveLength(23);
    expect(spring?.skippedHours).toEqual([1]);
  });

  test('and its profiles pool what the cells hold', async () => {
    const { byHour, byWeekday, seconds } = await sheetOf(AUTUMN);
    for (const rows of [byHour, byWeekday]) {
      expect(rows.reduce((sum, row) => sum + row.seconds.valid, 0)).toBe(seconds.valid);
      expect(rows.reduce((sum, row) => sum + row.seconds.expected, 0)).toBe(seconds.expected);
    }
    expect(byHour[1]?.seconds.expected).toBe((byHour[2]?.seconds.expected ?? 0) + 3600);
  });
});

describe('the bands by hour of the day', () => {
  test('are those of each hour by itself on one date', async () => {
    const [first, last] = ['2026-10-22T10:20:00Z', '2026-10-22T15:47:00Z'] as const;
    const { bandHours } = await sheetOf({ from: first, to: last });
    for (const [hour, from, to] of [
      [11, first, '2026-10-22T11:00:00Z'],
      [12, '2026-10-22T11:00:00Z', '2026-10-22T12:00:00Z'],
      [16, '2026-10-22T15:00:00Z', last],
    ] as const) {
      const { bands, octaves } = await statisticsOf({ from, to });
      expect(bandHours.bandsHz).toEqual(bands.map(({ nominalHz }) => nominalHz));
      bands.forEach(({ Leq }, at) => expectNear(bandHours.hours[hour]?.bandsLeq[at], Leq));
      octaves.forEach(({ Leq }, at) => expectNear(bandHours.hours[hour]?.octavesLeq[at], Leq));
    }
    expect(bandHours.hours[9]).toMatchObject({ coverage: 0, meetsMinimum: false });
  });

  test('pool, over a clock change, to those of the period', async () => {
    const { bandHours, byHour, bands } = await sheetOf(AUTUMN);
    bands.forEach(({ Leq }, at) => {
      const [energySec, sec] = bandHours.hours.reduce(
        ([energy, seconds], { bandsLeq }, hour) => {
          const validSec = typeof bandsLeq[at] !== 'number' ? 0 : (byHour[hour]?.seconds.valid ?? 0);
          return [energy + validSec * 10 ** ((bandsLeq[at] ?? 0) / 10), seconds + validSec];
        },
        [0, 0],
      );
      expectNear(10 * Math.log10(energySec / sec), Leq);
    });
  });
});
const expectNear = (actual: number | null | undefined, expected: number | null) =>
  expected === null ? expect(actual).toBeNull() : expect(actual).toBeCloseTo(expected, 6);

test('a period of more than a year is not told', () => {
  expect(isTooLong({ fromSec: 0, toSec: 366 * 86_400 })).toBe(false);
  expect(isTooLong({ fromSec: 0, toSec: 371 * 86_400 })).toBe(true);
});

/** Energy and seconds of counting minutes by UTC hour, which London’s hours are too. */
async function naiveHours(span: { from: string; to: string }) {
  const hours = new Map<number, { energySec: number; sec: number }>();
  const excluded = [at('2026-10-22T10:00:00Z'), at('2026-10-22T11:30:00Z')] as const;
  for (const { startSec, laeqCentiDb, flags } of await selectIntervals(
    station.id,
    at(span.from),
    at(span.to),
  )) {
    if (flags !== 0 || (startSec >= excluded[0] && startSec < excluded[1])) continue;
    const hour = Math.floor(startSec / 3600) * 3600;
    const held = hours.get(hour) ?? { energySec: 0, sec: 0 };
    hours.set(hour, { energySec: held.energySec + 60 * 10 ** (laeqCentiDb / 1000), sec: held.sec + 60 });
  }
  return hours;
}

function localHourOf(sec: number): { date: string; hour: number } {
  const parts = new Intl.DateTimeFormat('sv-SE', {
    timeZone: 'Europe/London',
    dateStyle: 'short',
    timeStyle: 'short',
  }).format(sec * 1000);
  return { date: parts.slice(0, 10), hour: Number(parts.slice(11, 13)) };
}

/** Start of an hour after the change of a date in London. */
function localHourSec(date: string, hour: number): number {
  const noon = at(`${date}T12:00:00Z`);
  const offsetHours = localHourOf(noon).hour - 12;
  return at(`${date}T00:00:00Z`) + (hour - offsetHours) * 3600;
}

const iso = (sec: number) => new Date(sec * 1000).toISOString().replace('.000', '');
