/** A range of levels in whole tens of dB for bars, from a foot below the lowest level to above the highest. */
export interface BarRange {
  footDb: number;
  topDb: number;
}

const SHORTEST_DB = 20;

/** The range for some levels in dB; null ones are left out. */
export function barRange(levelsDb: readonly (number | null)[]): BarRange {
  const held = levelsDb.filter((level) => level !== null);
  if (held.length === 0) return { footDb: 0, topDb: SHORTEST_DB };
  const footDb = Math.floor((Math.min(...held) - 3) / 10) * 10;
  const topDb = Math.max(Math.ceil((Math.max(...held) + 1) / 10) * 10, footDb + SHORTEST_DB);
  return { footDb, topDb };
}

/** Share of the height from the foot up that a level reaches, 0–1. */
export function barShare({ footDb, topDb }: BarRange, levelDb: number): number {
  return Math.min(1, Math.max(0, (levelDb - footDb) / (topDb - footDb)));
}
