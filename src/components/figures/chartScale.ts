/** Sizes that the drawings share, in their own units. */
export const CHART = { left: 46, width: 720, right: 46, top: 14, height: 220, foot: 34 } as const;

/** A level range of whole fives or tens that holds every level of a drawing. */
export interface ChartRange {
  lowDb: number;
  highDb: number;
}

/** The range of whole `stepDb` that holds some levels, at least `shortestDb` long; null of none. */
export function chartRange(
  levelsDb: readonly (number | null)[],
  stepDb: number,
  shortestDb: number,
): ChartRange | null {
  let [low, high] = [Infinity, -Infinity];
  for (const level of levelsDb) {
    if (level === null) continue;
    low = Math.min(low, level);
    high = Math.max(high, level);
  }
  if (low > high) return null;
  const lowDb = Math.floor(low / stepDb) * stepDb;
  return { lowDb, highDb: Math.max(lowDb + shortestDb, Math.ceil(high / stepDb) * stepDb) };
}

/** Where a level lies from the top of a plot. */
export function levelY({ lowDb, highDb }: ChartRange, levelDb: number): number {
  return round(CHART.top + (1 - (levelDb - lowDb) / (highDb - lowDb)) * CHART.height);
}

/** Where a share (0–1) of the plot's width lies. */
export function shareX(share: number): number {
  return round(CHART.left + share * (CHART.width - CHART.left - CHART.right));
}

/** Levels to rule and label, every 5 or 10 dB. */
export function ticksOf({ lowDb, highDb }: ChartRange): number[] {
  const stepDb = highDb - lowDb > 30 ? 10 : 5;
  const first = Math.ceil(lowDb / stepDb) * stepDb;
  return Array.from({ length: Math.floor((highDb - first) / stepDb) + 1 }, (_, at) => first + at * stepDb);
}

/** A coordinate to a hundredth of a unit. */
export function round(value: number): number {
  return Math.round(value * 100) / 100;
}
