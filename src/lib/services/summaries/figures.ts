import type { Coverage } from '#lib/contracts/summaries';
import { formatCoverage, formatLevelDb } from '#lib/format/levels';

/** Mark of a figure whose coverage is below the minimum. */
export const BELOW_MINIMUM = '†';

/** A level for people with a mark before it where the coverage behind it is below the minimum. */
export function markedLevelText(levelDb: number | null, meetsMinimum: boolean): string {
  return levelDb === null || meetsMinimum
    ? formatLevelDb(levelDb)
    : `${BELOW_MINIMUM} ${formatLevelDb(levelDb)}`;
}

/** What the bands of a month are taken over: bands have the month's coverage, not one each. */
export function bandCoverageText({ coverage, meetsMinimum }: Coverage): string {
  return `Coverage ${formatCoverage(coverage)}${meetsMinimum ? '.' : `: ${BELOW_MINIMUM} below the minimum.`}`;
}
