import { describe, expect, test } from 'vitest';
import { bandByNominalHz, bandsOf } from '#lib/acoustics/bands';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import {
  averagedNeighbourTones,
  surveyTones,
  thirdsTenthsOfDb,
  type TonalFinding,
} from '#lib/acoustics/tonality';
import { levelFromBandsDb } from '#lib/acoustics/weighting';
import { expectNear, present } from './support/fixtures';
import { LondonQuarters, MONTHS, minutesBetween, readLondonMinutes, sec } from './support/london';
import { expected } from './support/londonExpected';

const minutes = readLondonMinutes();
const quarters = new LondonQuarters(minutes);
const monthKeys = ['2026-03', '2026-04'] as const;
type MonthKey = (typeof monthKeys)[number];

const validOf = (month: MonthKey) =>
  minutesBetween(minutes, MONTHS[month].fromSec, MONTHS[month].toSec).filter((minute) => minute.isValid);

const months = new Map(
  monthKeys.map((month) => {
    const figures = new PeriodAccumulator({ bandClasses: true });
    for (const { interval } of validOf(month)) figures.add(interval, true);
    return [month, figures];
  }),
);

/** How many spectra have a finding, and in which bands. */
function countTones(findingsOfEach: readonly TonalFinding[][]) {
  const byBand: Record<string, number> = {};
  for (const { lowerIndex } of findingsOfEach.flat()) {
    const name = String(present(bandsOf(3).find((band) => band.index === lowerIndex)).nominalHz);
    byBand[name] = (byBand[name] ?? 0) + 1;
  }
  return { tonal: findingsOfEach.filter((findings) => findings.length > 0).length, byBand };
}

describe('London spectra, month by month (fixtures/london/expected_london.json)', () => {
  test.each(monthKeys)('month %s: every third and octave, Leq and L_N', (month) => {
    const wanted = expected.months[month];
    const figures = present(months.get(month));
    expect(Object.keys(wanted.bands)).toHaveLength(31);
    for (const [hz, band] of Object.entries(wanted.bands)) {
      const { index } = present(bandByNominalHz(3, Number(hz)), `band ${hz}`);
      expectNear(figures.bandLeqDb(index), band.Leq, 1e-4, hz);
      expect(figures.bandExceedanceLevelDb(index, 10), hz).toBe(band.L10_inv);
      expect(figures.bandExceedanceLevelDb(index, 50), hz).toBe(band.L50_inv);
      expect(figures.bandExceedanceLevelDb(index, 90), hz).toBe(band.L90_inv);
    }
    for (const [hz, octave] of Object.entries(wanted.octaves)) {
      const { index } = present(bandByNominalHz(1, Number(hz)), `octave ${hz}`);
      expectNear(figures.octaveLeqDb(index), octave.Leq, 1e-4, hz);
      // Expected from unrounded minute octaves; ours are of minutes rounded to tenths.
      expectNear(figures.octaveExceedanceLevelDb(index, 10), octave.L10_inv, 0.05 + 1e-9, hz);
      expectNear(figures.octaveExceedanceLevelDb(index, 90), octave.L90_inv, 0.05 + 1e-9, hz);
    }
    const wrong = present(wanted.octaves['125']).wrong_L90_from_summing_third_L90;
    expect(Math.abs(present(figures.octaveExceedanceLevelDb(-9, 90)) - wrong)).toBeGreaterThan(2);
    expect(figures.octaveLeqDb(-18), 'the 16 Hz octave lacks two thirds').toBeNull();
  });

  test.each(monthKeys)('month %s: levels from bands, weighted once', (month) => {
    const wanted = expected.months[month].from_bands;
    const bands = bandsOf(3).filter((band) => band.nominalHz >= 20);
    const figures = present(months.get(month));
    const levelsDb = bands.map((band) => figures.bandLeqDb(band.index));
    expectNear(levelFromBandsDb(levelsDb, bands, 'A'), wanted.LAeq_analytic, 1e-4);
    expectNear(levelFromBandsDb(levelsDb, bands, 'Z'), wanted.LZeq_20_20k, 1e-4);
    // The C value in the file is made with weights rounded to 0.1 dB.
    expectNear(levelFromBandsDb(levelsDb, bands, 'C'), wanted.LCeq_table, 0.05);
    expect(Math.abs(present(levelFromBandsDb(levelsDb, bands, 'A')) - wanted.wrong_A_twice)).toBeGreaterThan(
      0.9,
    );
  });

  test.each(monthKeys)('month %s: tonal minutes by both variants, by band', (month) => {
    const wanted = expected.months[month].tonal;
    const spectra = validOf(month).map((minute) => minute.thirdsTenths);
    expect(countTones(spectra.map(surveyTones))).toEqual({
      tonal: wanted.minutes_iso,
      byBand: wanted.by_band_iso,
    });
    expect(countTones(spectra.map(averagedNeighbourTones))).toEqual({
      tonal: wanted.minutes_avg_variant,
      byBand: wanted.by_band_avg_variant,
    });
  });

  test.each(monthKeys)('month %s: tonal hours of the hourly mean spectra', (month) => {
    const wanted = expected.months[month].tonal.hourly_spectra;
    // The file tests the hours with at least 75 % coverage.
    const hours = expected.hourly
      .map(([startUtc]) => sec(startUtc))
      .filter((startSec) => MONTHS[month].fromSec <= startSec && startSec < MONTHS[month].toSec)
      .map((startSec) => quarters.between(startSec, startSec + 3600))
      .filter((hour) => hour.sums.validSec >= 0.75 * 3600);
    const findings = hours.map((hour) => {
      const levelsDb = bandsOf(3).map((band) => hour.bandLeqDb(band.index));
      return surveyTones(thirdsTenthsOfDb(levelsDb, bandsOf(3)));
    });
    expect(hours).toHaveLength(wanted.hours_tested);
    expect(countTones(findings).byBand).toEqual(wanted.tonal_hours_by_band);
  });
});
