import { roundHalfUp } from '#lib/acoustics/rounding';
import type { FigureRow } from '#lib/contracts/figureSheet';
import { formatDifferenceDb, formatLevelDb } from '#lib/format/levels';

/** A figure's value as it is printed, without its unit. */
export function figureWords({
  value,
  decimals,
  isDifference,
}: Pick<FigureRow, 'value' | 'decimals' | 'isDifference'>): string {
  if (value !== null && isDifference) return formatDifferenceDb(value);
  return value !== null && decimals === 0 ? String(roundHalfUp(value, 0)) : formatLevelDb(value);
}

/** A share of time or energy in per cent, to 0.1; a trace is "<0.1 %", not 0. */
export function percentWords(share: number): string {
  if (share > 0 && share < 0.0005) return '<0.1\u00a0%';
  return `${roundHalfUp(share * 100, 1).toFixed(1)}\u00a0%`;
}
