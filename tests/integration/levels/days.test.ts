import { beforeAll, expect, test } from 'vitest';
import { findStation, type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Days, type Statistics } from '#lib/contracts/levels';
import { monthFigures } from '#lib/services/levels/month';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { expectSameLevel, makeDesk, sec, type Desk } from './support/desk';
import { expectBroadband, expectThird } from './support/expectSecondPath';
import { later, periodsOfDate } from './support/london';
import { invent, storeMeasured } from './support/measured';
import { broadband, exceeded, laeqSamples, type Sample } from './support/secondPath';

/** Days, months and a year of samples of 20 minutes against the second path, over both clock changes. */
const YEAR = { fromSec: sec('2025-01-01T00:00:00Z'), toSec: sec('2026-01-01T00:00:00Z') };

useFreshSchema();

let desk: Desk;
let station: StationRow;

beforeAll(async () => {
  desk = await makeDesk('days');
  const stationId = await makeStation(desk.networkId, 'YEAR', { intervalSec: 1200 });
  // From ten past on, so that samples lie across the edges of periods, into the next year's first night.
  const stretch = {
    fromSec: YEAR.fromSec + 600,
    toSec: YEAR.toSec + 12 * 3600,
    intervalSec: 1200,
    gaps: 0.02,
  };
  await storeMeasured(stationId, await invent({ ...stretch, bands: [-1, 1] }, 31));
  await aggregateAll(async () => undefined);
  const found = await findStation(desk.networkId, 'YEAR');
  if (!found) throw new Error('The station is not there.');
  station = found;
}, 240_000);

function ldenOf(levelsDb: {
  day: number | null;
  evening: number | null;
  night: number | null;
}): number | null {
  const { day, evening, night } = levelsDb;
  if (day === null || evening === null || night === null) return null;
  // Directive 2002/49/EC, Annex I.
  return (
    10 *
    Math.log10((12 * 10 ** (day / 10) + 4 * 10 ** ((evening + 5) / 10) + 8 * 10 ** ((night + 10) / 10)) / 24)
  );
}

test.each(['2025-03-27', '2025-10-23'])('six dates from %s, one with a clock change', async (from) => {
  const { days } = await desk.read<Days>('YEAR', 'days', { from, to: later(from, 6) });
  expect(days).toHaveLength(6);
  expect(days.map(({ hours }) => hours)).toEqual([24, 24, 24, from < '2025-06' ? 23 : 25, 24, 24]);
  for (const day of days) {
    const { day: daytime, evening, night, civil } = periodsOfDate(day.date);
    const levelOf = async (span: { fromSec: number; toSec: number }) =>
      (await broadband({ stationId: station.id, ...span })).laeqDb;
    const levelsDb = {
      day: await levelOf(daytime),
      evening: await levelOf(evening),
      night: await levelOf(night),
    };
    expectSameLevel(day.Lday, levelsDb.day, `${day.date} Lday`);
    expectSameLevel(day.Levening, levelsDb.evening, `${day.date} Levening`);
    expectSameLevel(day.Lnight, levelsDb.night, `${day.date} Lnight`);
    expectSameLevel(day.Lden, ldenOf(levelsDb), `${day.date} Lden`);
    const whole = { stationId: station.id, ...civil };
    const { laeqDb, validSec, lafmaxDb } = await broadband(whole);
    expectSameLevel(day.LAeq24h, laeqDb, `${day.date} LAeq24h`);
    expect([day.LAFmax, day.coverage], day.date).toEqual([
      lafmaxDb,
      validSec / (civil.toSec - civil.fromSec),
    ]);
    expect(day.LA50, day.date).toBe(exceeded(await laeqSamples(whole), 50, 1200));
  }
});

/** Energy, seconds and samples of a kind of period over the dates of a month. */
async function pooled(month: string, kind: 'day' | 'evening' | 'night') {
  let [energySec, validSec, expectedSec] = [0, 0, 0];
  const samples: Sample[] = [];
  for (let date = `${month}-01`; date.startsWith(month); date = later(date, 1)) {
    const span = periodsOfDate(date)[kind];
    const asked = { stationId: station.id, ...span };
    const figures = await broadband(asked);
    if (figures.laeqDb !== null) energySec += figures.validSec * 10 ** (figures.laeqDb / 10);
    validSec += figures.validSec;
    expectedSec += span.toSec - span.fromSec;
    samples.push(...(await laeqSamples(asked)));
  }
  return { laeqDb: 10 * Math.log10(energySec / validSec), validSec, expectedSec, samples };
}

test.each(['2025-03', '2025-10', '2025-12'])('%s pools its days, evenings and nights', async (month) => {
  const { periods, ldenDb } = await monthFigures({ station, month });
  const levelsDb = { day: NaN, evening: NaN, night: NaN };
  for (const kind of ['day', 'evening', 'night'] as const) {
    const wanted = await pooled(month, kind);
    levelsDb[kind] = wanted.laeqDb;
    expectSameLevel(periods[kind]?.laeqDb, wanted.laeqDb, `${month} ${kind}`);
    expect(periods[kind]?.seconds).toMatchObject({ expected: wanted.expectedSec, valid: wanted.validSec });
    expect(periods[kind]?.la10Db).toBe(exceeded(wanted.samples, 10, 1200));
    expect(periods[kind]?.la90Db).toBe(exceeded(wanted.samples, 90, 1200));
  }
  expectSameLevel(ldenDb, ldenOf(levelsDb), `${month} Lden`);
});

test('a year equals the second path, and its twelve months pooled by energy', async () => {
  const year = await statistics(YEAR.fromSec, YEAR.toSec);
  const asked = { stationId: station.id, ...YEAR };
  await expectBroadband(year, asked, 'year');
  await expectThird(year, asked, 0, 'year');
  let [energySec, validSec] = [0, 0];
  for (let month = 1; month <= 12; month += 1) {
    const first = `2025-${String(month).padStart(2, '0')}-01`;
    const next = month === 12 ? '2026-01-01' : `2025-${String(month + 1).padStart(2, '0')}-01`;
    const part = await statistics(periodsOfDate(first).civil.fromSec, periodsOfDate(next).civil.fromSec);
    energySec += part.seconds.valid * 10 ** ((part.LAeq ?? NaN) / 10);
    validSec += part.seconds.valid;
  }
  expect(validSec).toBe(year.seconds.valid);
  expectSameLevel(year.LAeq, 10 * Math.log10(energySec / validSec), 'months pooled');
});

function statistics(fromSec: number, toSec: number): Promise<Statistics> {
  return desk.read<Statistics>('YEAR', 'statistics', {
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
  });
}
