import { roundHalfUp } from '#lib/acoustics/rounding';

/** What stands where nothing was measured. */
export const NO_FIGURE = '—';

/** A level in dB to 0.1, half up, without its unit: "64.9", "−3.0"; a dash where there is none. */
export function formatLevelDb(levelDb: number | null | undefined): string {
  return levelDb === null || levelDb === undefined ? NO_FIGURE : signed(roundHalfUp(levelDb, 1), 1);
}

/** A difference of levels with its sign: "+0.6", "−1.2", "0.0". */
export function formatDifferenceDb(differenceDb: number): string {
  const rounded = roundHalfUp(differenceDb, 1);
  return rounded > 0 ? `+${signed(rounded, 1)}` : signed(rounded, 1);
}

/**
 * Coverage as a whole per cent. Never rounded up: "100 %" is said of a complete period only, and a period just short of
 * its minimum does not seem to reach it. A trace of data is "<1 %", not 0.
 */
export function formatCoverage(coverage: number): string {
  const percent = Math.floor(coverage * 100 + 1e-9);
  if (percent === 0 && coverage > 0) return '<1\u00a0%';
  return `${percent}\u00a0%`;
}

function signed(value: number, decimals: number): string {
  const digits = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(digits) !== 0 ? `\u2212${digits}` : digits;
}
