import { type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { readJson } from './fixtures';

/** What is expected of the London set: fixtures/london/expected_london.json, made beside its input for these checks. */

export interface ByPercent {
  L1: number;
  L10: number;
  L50: number;
  L90: number;
  L95: number;
}
export interface ExpectedPeriod {
  n: number;
  elapsed_min: number;
  coverage: number;
  LAeq: number | null;
}
export interface ExpectedMonth extends ExpectedPeriod {
  LAFmax: number;
  LN: { inv: ByPercent };
  Lday: number;
  Levening: number;
  Lnight: number;
  Lnight_evening_dated: number;
  Lden_evening_dated: number;
  LN_period: Record<'day' | 'evening', ByPercent>;
  bands: Record<string, { Leq: number; L10_inv: number; L50_inv: number; L90_inv: number }>;
  octaves: Record<
    string,
    { Leq: number; L10_inv: number; L90_inv: number; wrong_L90_from_summing_third_L90: number }
  >;
  /** Levels that mistakes of the field give. */
  wrong_ways: Record<string, number>;
  from_bands: { LAeq_analytic: number; LCeq_table: number; LZeq_20_20k: number; wrong_A_twice: number };
  tonal: {
    minutes_iso: number;
    by_band_iso: Record<string, number>;
    minutes_avg_variant: number;
    by_band_avg_variant: Record<string, number>;
    hourly_spectra: { hours_tested: number; tonal_hours_by_band: Record<string, number> };
  };
}
export interface Expected {
  rows: number;
  valid_rows: number;
  elapsed_minutes: number;
  coverage: number;
  hourly: [string, string, number, number | null, number | null, number | null, number | null][];
  calendar_days: (ExpectedPeriod & {
    date: string;
    LAFmax: number | null;
    LN: { inv: Record<keyof ByPercent, number | null> };
    tonal_minutes_iso: number;
    periods: Record<PeriodKind, ExpectedPeriod>;
  })[];
  nights: (ExpectedPeriod & {
    night_of: string;
    start_utc: string;
    end_utc: string;
    LA90_inv: number | null;
    LAFmax: number | null;
  })[];
  acoustic_days: { date: string; Lden: number | null }[];
  months: Record<'2026-03' | '2026-04', ExpectedMonth>;
  whole: { LAeq: number; LN: { inv: ByPercent }; tonal_minutes_iso: number };
  exceedances: Record<string, string[]>;
}

export const expected = readJson<Expected>('london/expected_london.json');

/** The N of the exceedance levels that the file gives. */
export const PERCENTS = [1, 10, 50, 90, 95] as const;
