import { formatLevelDb } from '#lib/format/levels';

/** Mark of a figure whose coverage is below the minimum. */
export const BELOW_MINIMUM = '†';

/** A level for people with a mark before it where the coverage behind it is below the minimum. */
export function markedLevelText(levelDb: number | null, meetsMinimum: boolean): string {
  return levelDb === null || meetsMinimum
    ? formatLevelDb(levelDb)
    : `${BELOW_MINIMUM} ${formatLevelDb(levelDb)}`;
}
