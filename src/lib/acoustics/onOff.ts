/** A level of one quarter-hour, dB, with the block that it belongs to: quarter-hours of one block are not independent. */
export interface BlockedLevel {
  levelDb: number;
  block: number;
}

/** What a set of quarter-hour levels comes to. */
export interface LevelSet {
  count: number;
  blockCount: number;
  /** Arithmetic mean of the levels, dB. */
  meanDb: number | null;
  /** Standard deviation of the levels (n − 1), dB; null below two. */
  spreadDb: number | null;
  /** Standard uncertainty of the mean from the differences between blocks, dB; null below `LEAST_BLOCKS`. */
  standardDb: number | null;
}

/** With fewer blocks nothing is said about the uncertainty of a mean. Bittern's own figure. */
export const LEAST_BLOCKS = 5;

/**
 * Mean and spread of quarter-hour levels. Neighbouring quarter-hours are alike, so the uncertainty of the mean comes from the
 * blocks (occasions), not from the quarter-hours: u² = m/(m−1) · Σ_blocks (Σ (L − mean))² / n², the usual estimate for clusters.
 */
export function levelSet(levels: readonly BlockedLevel[]): LevelSet {
  const count = levels.length;
  const residuals = new Map<number, number>();
  const meanDb = count === 0 ? null : levels.reduce((sum, { levelDb }) => sum + levelDb, 0) / count;
  let squares = 0;
  for (const { levelDb, block } of levels) {
    const residual = levelDb - (meanDb ?? 0);
    squares += residual ** 2;
    residuals.set(block, (residuals.get(block) ?? 0) + residual);
  }
  const blockCount = residuals.size;
  const between = [...residuals.values()].reduce((sum, residual) => sum + residual ** 2, 0);
  return {
    count,
    blockCount,
    meanDb,
    spreadDb: count < 2 ? null : Math.sqrt(squares / (count - 1)),
    standardDb:
      blockCount < LEAST_BLOCKS ? null : Math.sqrt((blockCount / (blockCount - 1)) * between) / count,
  };
}

/** Difference of two means and its expanded uncertainty U = 2u, dB; null where either cannot be told. */
export function meanDifference(
  on: LevelSet,
  off: LevelSet,
): { differenceDb: number | null; expandedDb: number | null } {
  const isKnown = on.meanDb !== null && off.meanDb !== null;
  return {
    differenceDb: isKnown ? (on.meanDb ?? 0) - (off.meanDb ?? 0) : null,
    expandedDb:
      on.standardDb === null || off.standardDb === null
        ? null
        : 2 * Math.hypot(on.standardDb, off.standardDb),
  };
}
