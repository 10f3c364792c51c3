import { beforeAll, expect, test } from 'vitest';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { formatInstantUtc } from '#lib/contracts/common';
import { type BandStatistics, type Statistics } from '#lib/contracts/levels';
import { useFreshSchema } from '../integration/support/freshSchema';
import { expectNear, present } from './support/fixtures';
import { MONTHS, readLondonMinutes } from './support/london';
import { expected, type ExpectedMonth } from './support/londonExpected';
import { expectLan, expectNot, recordOf } from './support/londonPosted';
import { PostedNetwork } from './support/postedStation';

/** The same sixty days as london.test.ts, but from the monitor's posts to `…/statistics`: fixtures/london. */
const TOLERANCE_DB = 0.01;

useFreshSchema();

let network: PostedNetwork;

beforeAll(async () => {
  network = await PostedNetwork.make();
  await network.post(
    'MINUTES',
    20,
    20_000,
    readLondonMinutes().map((minute) => recordOf(minute)),
  );
  await aggregateAll(async () => undefined);
});

const statistics = (fromSec: number, toSec: number, more: Record<string, string> = {}) =>
  network.get<Statistics>('MINUTES', 'statistics', {
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
    ...more,
  });

test('the whole: rows, coverage, LAeq, L_N', async () => {
  const whole = await statistics(MONTHS['2026-03'].fromSec, MONTHS['2026-04'].toSec);
  expect(whole.seconds).toEqual({
    expected: expected.elapsed_minutes * 60,
    valid: expected.valid_rows * 60,
    excluded: (expected.rows - expected.valid_rows) * 60,
  });
  expect(whole.coverage).toBe(expected.valid_rows / expected.elapsed_minutes);
  expect(whole.sampleSeconds).toBe(60);
  expectNear(whole.LAeq, expected.whole.LAeq, TOLERANCE_DB, 'LAeq');
  expectLan(whole.LAN, expected.whole.LN.inv, 'whole');
});

test('hour by hour: valid minutes, LAeq, LA10, LA90, LAFmax; too few minutes have no L10', async () => {
  // Every fifth, so that each hour of the day and each day of the week has its turn, and the night of the clock change.
  const hours = expected.hourly.filter(([start], at) => at % 5 === 0 || start.startsWith('2026-03-29T0'));
  expect(hours.length).toBeGreaterThan(280);
  for (const [start, , validMinutes, laeq, la10, la90, lafmax] of hours) {
    const fromSec = Date.parse(start) / 1000;
    const hour = await statistics(fromSec, fromSec + 3600);
    expect(hour.seconds.valid, start).toBe(validMinutes * 60);
    expect(hour.coverage, start).toBe(validMinutes / 60);
    expectNear(hour.LAeq, laeq, TOLERANCE_DB, start);
    expect(hour.LAFmax, start).toBe(lafmax);
    const hasSamples = validMinutes >= 30;
    expect(hour.LAN['10'], start).toBe(hasSamples ? la10 : null);
    expect(hour.LAN['90'], start).toBe(hasSamples ? la90 : null);
    expect(hour.LAN['1'], `${start}: 60 samples are too few for L1`).toBeNull();
  }
});

test.each(['2026-03', '2026-04'] as const)(
  '%s by the clock: LAeq, L_N, every third and octave; none of the wrong ways',
  async (month) => {
    const wanted = expected.months[month];
    const { fromSec, toSec } = MONTHS[month];
    const figures = await statistics(fromSec, toSec);
    expect(figures.seconds.expected).toBe(wanted.elapsed_min * 60);
    expect(figures.coverage).toBe(wanted.n / wanted.elapsed_min);
    expectNear(figures.LAeq, wanted.LAeq, TOLERANCE_DB, 'LAeq');
    expect(figures.LAFmax).toBe(wanted.LAFmax);
    expectLan(figures.LAN, wanted.LN.inv, month);
    expectThirds(figures.bands, wanted.bands);
    expectOctaves(figures.octaves, wanted.octaves);
    expectNoMistake(figures, wanted);

    const all = await statistics(fromSec, toSec, { validity: 'all' });
    const withAll = wanted.wrong_ways['LAeq_all_flagged_rows_included'];
    expectNear(all.LAeq, present(withAll), TOLERANCE_DB, 'everything measured');
    expect(all.seconds.excluded).toBe(0);
    expect(all.seconds.valid).toBe(figures.seconds.valid + figures.seconds.excluded);
  },
);

function expectThirds(thirds: readonly BandStatistics[], wanted: ExpectedMonth['bands']): void {
  expect(thirds).toHaveLength(Object.keys(wanted).length);
  for (const { nominalHz, Leq, L10, L50, L90 } of thirds) {
    const band = present(wanted[String(nominalHz)], `band ${nominalHz}`);
    expectNear(Leq, band.Leq, TOLERANCE_DB, `${nominalHz} Hz`);
    expect([L10, L50, L90], `${nominalHz} Hz`).toEqual([band.L10_inv, band.L50_inv, band.L90_inv]);
  }
}

function expectOctaves(octaves: readonly BandStatistics[], wanted: ExpectedMonth['octaves']): void {
  for (const [hz, wantedOctave] of Object.entries(wanted)) {
    const octave = octaveAt(octaves, Number(hz));
    expectNear(octave.Leq, wantedOctave.Leq, TOLERANCE_DB, `octave ${hz}`);
    // The fixture's octaves of a minute are not rounded to tenths before they are ranked.
    expectNear(octave.L10, wantedOctave.L10_inv, 0.05 + 1e-9, `octave ${hz} L10`);
    expectNear(octave.L90, wantedOctave.L90_inv, 0.05 + 1e-9, `octave ${hz} L90`);
  }
  const summed = wanted['125']?.wrong_L90_from_summing_third_L90;
  expectNot(octaveAt(octaves, 125).L90, summed, 'an L90 summed from thirds');
}

function octaveAt(octaves: readonly BandStatistics[], hz: number): BandStatistics {
  return present(
    octaves.find(({ nominalHz }) => nominalHz === hz),
    `octave ${hz}`,
  );
}

function expectNoMistake({ LAeq, LAN }: Statistics, { wrong_ways: wrong }: ExpectedMonth): void {
  for (const mistake of [
    'LAeq_arithmetic_mean_of_minutes',
    'LAeq_missing_as_zero_energy',
    'LAeq_all_flagged_rows_included',
  ]) {
    expectNot(LAeq, wrong[mistake], mistake);
  }
  expectNot(LAN['10'], wrong['L10_from_hourly_Leq_inv'], 'L10 of hourly levels');
  expectNot(LAN['90'], wrong['L90_from_hourly_Leq_inv'], 'L90 of hourly levels');
}
