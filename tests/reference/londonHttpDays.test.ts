import { beforeAll, describe, expect, test } from 'vitest';
import { type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { type DayFigures } from '#lib/contracts/levels';
import { monthFigures, type MonthFigures } from '#lib/services/levels/month';
import { startOfDaySec } from '#lib/time/zone';
import { useFreshSchema } from '../integration/support/freshSchema';
import { expectNear, present } from './support/fixtures';
import { readLondonMinutes, sec, ZONE } from './support/london';
import { expected } from './support/londonExpected';
import { expectLan, expectNot, recordOf } from './support/londonPosted';
import { PostedNetwork } from './support/postedStation';

/**
 * The same sixty days as london.test.ts, but from the monitor's posts to `…/days` and the month of a summary: fixtures/london.
 * Days hold no band figures, so one third of each minute is posted.
 */
const TOLERANCE_DB = 0.01;

useFreshSchema();

let network: PostedNetwork;
let station: StationRow;

beforeAll(async () => {
  network = await PostedNetwork.make();
  const records = readLondonMinutes().map((minute) => recordOf(minute, 1));
  station = await network.post('MINUTES', 20, 20, records);
  await aggregateAll(async () => undefined);
});

describe('days', () => {
  let days: DayFigures[] = [];
  const dayOf = (date: string) => days.find((day) => day.date === date);

  beforeAll(async () => {
    const answer = await network.get<{ days: DayFigures[] }>('MINUTES', 'days', {
      from: '2026-03-01',
      to: '2026-04-30',
    });
    days = answer.days;
  });

  test('every civil day, with its day and evening: coverage, LAeq, LAFmax, L_N', () => {
    expect(days.map(({ date }) => date)).toEqual(expected.calendar_days.map(({ date }) => date));
    for (const wanted of expected.calendar_days) {
      const day = present(dayOf(wanted.date));
      expect(day.hours, day.date).toBe(wanted.elapsed_min / 60);
      expect(day.coverage, day.date).toBe(wanted.n / wanted.elapsed_min);
      expect(day.meetsMinimum, day.date).toBe(wanted.n / wanted.elapsed_min >= 0.75);
      expectNear(day.LAeq24h, wanted.LAeq, TOLERANCE_DB, day.date);
      expect(day.LAFmax, day.date).toBe(wanted.LAFmax);
      const { L10, L50, L90 } = wanted.LN.inv;
      const levels = wanted.n >= 30 ? [L10, L50, L90] : [null, null, null];
      expect([day.LA10, day.LA50, day.LA90], day.date).toEqual(levels);
      expectNear(day.Lday, wanted.periods.day.LAeq, TOLERANCE_DB, `${day.date} Lday`);
      expectNear(day.Levening, wanted.periods.evening.LAeq, TOLERANCE_DB, `${day.date} Levening`);
      for (const kind of ['day', 'evening'] as const) {
        const { n, elapsed_min: elapsedMin } = wanted.periods[kind];
        expect(present(day.periods[kind]).coverage, `${day.date} ${kind}`).toBe(n / elapsedMin);
      }
    }
    expect(dayOf('2026-03-29')?.hours).toBe(23);
  });

  test('every night by the evening it begins on, seven hours over the clock change', () => {
    // The night of 28 February is not of a date that is asked for.
    const nights = expected.nights.filter(({ night_of: date }) => dayOf(date));
    expect(nights.length).toBe(60);
    for (const wanted of nights) {
      const date = wanted.night_of;
      const { Lnight, periods } = present(dayOf(date));
      expectNear(Lnight, wanted.LAeq, TOLERANCE_DB, date);
      expect(periods.night.seconds.valid, date).toBe(wanted.n * 60);
      const elapsedSec = sec(periods.night.to) - sec(periods.night.from);
      expect(periods.night.seconds.expected, date).toBe(elapsedSec);
      expect(elapsedSec, date).toBe((date === '2026-03-28' ? 7 : 8) * 3600);
      expect(sec(periods.night.from), date).toBe(sec(wanted.start_utc));
      expect(sec(periods.night.to), date).toBe(sec(wanted.end_utc));
      expect(periods.night.coverage, date).toBe(wanted.n / wanted.elapsed_min);
    }
  });

  test('Lden by the same convention, null where a period has no data', () => {
    for (const { date, Lden } of expected.acoustic_days) {
      expectNear(present(dayOf(date)).Lden, Lden, TOLERANCE_DB, date);
    }
    expect(days.filter(({ Lden }) => Lden === null)).toHaveLength(3);
  });
});

describe.each(['2026-03', '2026-04'] as const)('the month %s for its summary', (month) => {
  const wanted = expected.months[month];
  let figures: MonthFigures;

  beforeAll(async () => {
    figures = await monthFigures({ station, month });
  });

  test('periods pooled by the date they begin on, then Lden once', () => {
    const { day, evening, night } = figures.periods;
    expectNear(day.laeqDb, wanted.Lday, TOLERANCE_DB, 'Lday');
    expectNear(present(evening).laeqDb, wanted.Levening, TOLERANCE_DB, 'Levening');
    expectNear(night.laeqDb, wanted.Lnight_evening_dated, TOLERANCE_DB, 'Lnight');
    expectNear(figures.ldenDb, wanted.Lden_evening_dated, TOLERANCE_DB, 'Lden');
    const { L10, L50, L90 } = wanted.LN_period.day;
    expect([day.la10Db, day.la50Db, day.la90Db]).toEqual([L10, L50, L90]);
    for (const mistake of Object.keys(wanted.wrong_ways).filter((name) => name.startsWith('Lden'))) {
      expectNot(figures.ldenDb, wanted.wrong_ways[mistake], mistake);
    }
    expectNot(night.laeqDb, wanted.Lnight, 'nights cut at midnight');
  });

  test('by the clock: LAeq, L_N, and when it was loudest', () => {
    expectNear(figures.statistics.LAeq, wanted.LAeq, TOLERANCE_DB, 'LAeq');
    expectLan(figures.statistics.LAN, wanted.LN.inv, month);
    const loudest = present(figures.loudest);
    expect(loudest.lafmaxDb).toBe(wanted.LAFmax);
    const minute = readLondonMinutes().find(({ startSec }) => startSec === loudest.startSec);
    expect(minute?.interval.lafmaxCentiDb).toBe(Math.round(wanted.LAFmax * 100));
    expect(minute?.isValid).toBe(true);
    const endDate = month === '2026-03' ? '2026-04-01' : '2026-05-01';
    const elapsedSec = startOfDaySec(endDate, ZONE) - figures.fromSec;
    expect(figures.statistics.seconds).toMatchObject({ expected: elapsedSec, valid: wanted.n * 60 });
  });
});
