import { toTenths } from './rounding';

/**
 * Percentile rank of a level among others, per cent: 100·(B + E/2)/n, where B of the n values are below it and E equal it. This is the
 * mid-rank formula of educational statistics (the mean of the "strict" and the "weak" rank). Values are compared on tenths of a dB,
 * so that equal figures are ties. Null among none.
 */
export function percentileRank(levelDb: number, othersDb: readonly number[]): number | null {
  if (othersDb.length === 0) return null;
  const level = toTenths(levelDb);
  let below = 0;
  let equal = 0;
  for (const otherDb of othersDb) {
    const other = toTenths(otherDb);
    if (other < level) below += 1;
    else if (other === level) equal += 1;
  }
  return (100 * (below + equal / 2)) / othersDb.length;
}
