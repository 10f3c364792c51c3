import { beforeAll, describe, expect, test } from 'vitest';
import { findNetworkBySlug } from '#db/queries/networks';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { bandLabel } from '#lib/acoustics/bands';
import { type DayFigures, type Statistics } from '#lib/contracts/levels';
import { monthDocumentSchema, type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import { computeMonth } from '#lib/services/summaries/document/computeMonth';
import { useFreshSchema } from '../integration/support/freshSchema';
import { expectNear, present } from './support/fixtures';
import { readLondonMinutes } from './support/london';
import { expected } from './support/londonExpected';
import { recordOf } from './support/londonPosted';
import { PostedNetwork } from './support/postedStation';

/** The London set of March 2026 as its month’s document: against fixtures/london, and against what the interface answers. */
const TOLERANCE_DB = 0.01;
const SAME_DB = 1e-6;
const MONTH = { from: '2026-03-01T00:00:00Z', to: '2026-03-31T23:00:00Z' };

useFreshSchema();

const wanted = expected.months['2026-03'];
let network: PostedNetwork;
let doc: MonthDocument;
let station: DocumentStation;

beforeAll(async () => {
  network = await PostedNetwork.make();
  await network.post(
    'MINUTES',
    20,
    20_000,
    readLondonMinutes().map((minute) => recordOf(minute)),
  );
  await aggregateAll(async () => undefined);
  doc = await computeMonth(
    present(await findNetworkBySlug('posted')),
    '2026-03',
    new Date('2026-05-04T06:00:00Z'),
  );
  station = present(doc.stations[0]);
});

test('the document is of its published form and survives being written and read', () => {
  expect(monthDocumentSchema.parse(JSON.parse(JSON.stringify(doc)))).toEqual(doc);
  expect(doc).toMatchObject({ isToDate: false, ...MONTH, nightsTo: '2026-04-01T06:00:00Z' });
});

test('levels of the month, periods by their dates and the rest by the clock', () => {
  const { figures } = station;
  expectNear(figures.Lday, wanted.Lday, TOLERANCE_DB, 'Lday');
  expectNear(figures.Levening, wanted.Levening, TOLERANCE_DB, 'Levening');
  expectNear(figures.Lnight, wanted.Lnight_evening_dated, TOLERANCE_DB, 'Lnight');
  expectNear(figures.Lden, wanted.Lden_evening_dated, TOLERANCE_DB, 'Lden');
  expectNear(figures.LAeq, wanted.LAeq, TOLERANCE_DB, 'LAeq');
  const { L1, L10, L50, L90, L95 } = wanted.LN.inv;
  const { LA1, LA10, LA50, LA90, LA95 } = figures;
  expect([LA1, LA10, LA50, LA90, LA95]).toEqual([L1, L10, L50, L90, L95]);
  expect(figures.LAFmax).toBe(wanted.LAFmax);
  expect(figures.coverage).toBe(wanted.n / wanted.elapsed_min);
});

test('bands and octaves, each L_N of its own samples', () => {
  for (const band of station.bands) {
    const of = present(wanted.bands[String(band.nominalHz)], bandLabel(band));
    expectNear(band.Leq, of.Leq, TOLERANCE_DB, `${band.nominalHz}`);
    expect([band.L10, band.L50, band.L90], `${band.nominalHz}`).toEqual([of.L10_inv, of.L50_inv, of.L90_inv]);
  }
  expect(station.bands).toHaveLength(31);
  for (const [hz, of] of Object.entries(wanted.octaves)) {
    const octave = present(station.octaves.find(({ nominalHz }) => nominalHz === Number(hz)));
    expectNear(octave.Leq, of.Leq, TOLERANCE_DB, hz);
    // Of samples that are not rounded to classes of a tenth there.
    expectNear(octave.L10, of.L10_inv, 0.05 + TOLERANCE_DB, `${hz} L10`);
    expectNear(octave.L90, of.L90_inv, 0.05 + TOLERANCE_DB, `${hz} L90`);
  }
});

describe('the interface answers the same', () => {
  test('day by day', async () => {
    const query = { from: '2026-03-01', to: '2026-04-01' };
    const { days } = await network.get<{ days: DayFigures[] }>('MINUTES', 'days', query);
    expect(station.days.map(({ date }) => date)).toEqual(days.map(({ date }) => date));
    for (const [at, day] of days.entries()) {
      const own = present(station.days[at]);
      for (const key of [
        'Lday',
        'Levening',
        'Lnight',
        'Lden',
        'LAeq24h',
        'LAFmax',
        'LA10',
        'LA50',
        'LA90',
      ] as const) {
        expectNear(own[key], day[key], SAME_DB, `${day.date} ${key}`);
      }
      expect(own.seconds, day.date).toEqual(day.seconds);
    }
    const hours = station.hours.filter(({ date }) => date === '2026-03-29').map(({ hour }) => hour);
    expect(hours).toHaveLength(23);
    expect(hours).not.toContain(1);
  });

  test('by the clock, with rules and with everything measured', async () => {
    const valid = await network.get<Statistics>('MINUTES', 'statistics', MONTH);
    const all = await network.get<Statistics>('MINUTES', 'statistics', { ...MONTH, validity: 'all' });
    const compared = (quantity: string) =>
      present(station.exclusions.figures.find((figure) => figure.quantity === quantity));
    for (const [quantity, of] of [
      ['LAeq', ({ LAeq }: Statistics) => LAeq],
      ['LA10', ({ LAN }: Statistics) => LAN['10'] ?? null],
      ['LA50', ({ LAN }: Statistics) => LAN['50'] ?? null],
      ['LA90', ({ LAN }: Statistics) => LAN['90'] ?? null],
      ['LAFmax', ({ LAFmax }: Statistics) => LAFmax],
    ] as const) {
      expectNear(compared(quantity).valid, of(valid), SAME_DB, quantity);
      expectNear(compared(quantity).all, of(all), SAME_DB, `${quantity} of everything`);
    }
    expect(all.LAeq).not.toBe(valid.LAeq);
    expect(station.figures.seconds).toEqual(valid.seconds);
    const leftOutSec = station.exclusions.leftOut.reduce((sum, { seconds }) => sum + seconds, 0);
    expect(leftOutSec).toBeGreaterThanOrEqual(valid.seconds.excluded);
  });
});

test('the year to date pools energies: before March lie the hours of one night, April adds its own', async () => {
  const { yearToDate, figures } = station;
  for (const key of ['Lday', 'Levening', 'LAeq', 'LA10', 'LA50', 'LA90', 'LAFmax'] as const) {
    expectNear(yearToDate[key], figures[key], SAME_DB, key);
  }
  const nights = expected.nights.filter(({ night_of: date }) => date < '2026-04-01');
  expectNear(yearToDate.Lnight, pooledDb(nights.map(({ LAeq, n }) => [LAeq, n])), TOLERANCE_DB, 'Lnight');
  const network = present(await findNetworkBySlug('posted'));
  const april = present(
    (await computeMonth(network, '2026-04', new Date('2026-05-04T06:00:00Z'))).stations[0],
  );
  const months = [figures, april.figures].map(({ LAeq, seconds }) => [LAeq, seconds.valid] as const);
  expectNear(april.yearToDate.LAeq, pooledDb(months), SAME_DB, 'LAeq');
  expect(april.yearToDate.seconds.valid).toBe(figures.seconds.valid + april.figures.seconds.valid);
  expect(april.yearToDate.LA50).not.toBeNull();
});

/** Levels in dB pooled by energy, each with its weight. */
function pooledDb(parts: readonly (readonly [levelDb: number | null, weight: number])[]): number {
  const known = parts.flatMap(([levelDb, weight]) => (levelDb === null ? [] : [{ levelDb, weight }]));
  const weights = known.reduce((sum, { weight }) => sum + weight, 0);
  return (
    10 *
    Math.log10(known.reduce((sum, { levelDb, weight }) => sum + 10 ** (levelDb / 10) * weight, 0) / weights)
  );
}

test('uncertainty: gaps add to the instrument’s share, and Lden weighs its periods', () => {
  const { U, uncertainty } = station.figures;
  expect(uncertainty).toMatchObject({ instrument: 0.5, drift: 0, driftKnown: 'none' });
  expect(uncertainty.gaps).toBeGreaterThan(0);
  expectNear(U.LAeq, 2 * Math.hypot(0.5, present(uncertainty.gaps)), 1e-9, 'U of LAeq');
  for (const of of Object.values(U)) expect(of).toBeGreaterThanOrEqual(1);
  const parts = [U.Lday, U.Levening, U.Lnight].map((of) => present(of));
  expect(present(U.Lden)).toBeLessThan(Math.max(...parts));
  const whole = present(station.days.find(({ periods }) => periods.evening?.coverage === 1));
  expect(whole.U.Levening).toBe(1);
});
