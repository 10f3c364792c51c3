import { roundHalfUp } from '#lib/acoustics/rounding';

/** Mark of a figure whose coverage is below the minimum. */
export const BELOW_MINIMUM = '†';

/** A level for people, rounded once, half up, to 0.1 dB; a dash where there is none. */
export function levelText(levelDb: number | null): string {
  return levelDb === null ? '–' : roundHalfUp(levelDb, 1).toFixed(1).replace('-', '−');
}

/** The same with a mark before it where the coverage behind it is below the minimum. */
export function markedLevelText(levelDb: number | null, meetsMinimum: boolean): string {
  return levelDb === null || meetsMinimum ? levelText(levelDb) : `${BELOW_MINIMUM} ${levelText(levelDb)}`;
}

/** A share in per cent to 0.1, which never turns "not all" into 100 % or "a little" into 0 %. */
export function coverageText(coverage: number): string {
  const percent = roundHalfUp(coverage * 100, 1);
  if (coverage < 1 && percent === 100) return '99.9 %';
  if (coverage > 0 && percent === 0) return '0.1 %';
  return `${percent.toFixed(1)} %`;
}
