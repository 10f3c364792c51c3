import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';

/** A range of levels in whole dB. */
export interface LevelRange {
  lowDb: number;
  highDb: number;
}

const SHORTEST_DB = 30;

/** The range that spans two, so that what is drawn in it can be compared; of one where the other is not known. */
export function spanningRange<A extends LevelRange | null>(a: A, b: A): A {
  if (a === null || b === null) return a ?? b;
  return { ...a, lowDb: Math.min(a.lowDb, b.lowDb), highDb: Math.max(a.highDb, b.highDb) };
}

/** The range, in tens of dB, that holds the given levels (hundredths of a dB; none skipped) and further ones in dB. */
export function traceRange(seriesCentiDb: readonly Int16Array[], alsoDb: readonly number[]): LevelRange {
  let low = Infinity;
  let high = -Infinity;
  for (const series of seriesCentiDb) {
    for (const centiDb of series) {
      if (centiDb === NO_LEVEL_CENTI_DB) continue;
      low = Math.min(low, centiDb / 100);
      high = Math.max(high, centiDb / 100);
    }
  }
  for (const levelDb of alsoDb) {
    low = Math.min(low, levelDb);
    high = Math.max(high, levelDb);
  }
  if (low > high) return { lowDb: 30, highDb: 90 };
  const lowDb = Math.floor(low / 10) * 10;
  return { lowDb, highDb: Math.max(lowDb + SHORTEST_DB, Math.ceil((high + 0.5) / 10) * 10) };
}

/** Levels to draw lines at: every 10 dB, or every 20 where those would be closer than `leastPx`. */
export function levelTicks(range: LevelRange, heightPx: number, leastPx: number): number[] {
  const tens = (range.highDb - range.lowDb) / 10;
  const stepDb = heightPx / tens >= leastPx ? 10 : 20;
  const ticks: number[] = [];
  for (let db = Math.ceil(range.lowDb / stepDb) * stepDb; db < range.highDb; db += stepDb) ticks.push(db);
  return ticks;
}

/** Height of a level above the bottom turned into pixels from the top. */
export function pxOfLevel(range: LevelRange, heightPx: number, levelDb: number): number {
  return heightPx * (1 - (levelDb - range.lowDb) / (range.highDb - range.lowDb));
}

/**
 * The range that the colours of a spectrogram span, in fives of dB: all but the quietest five and the loudest two in a
 * thousand of the levels, at least 30 dB. `weightsCentiDb` is added per band (A-weighting in the A view).
 */
export function colourRange(levelsCentiDb: Int16Array, weightsCentiDb: readonly number[]): LevelRange | null {
  const CLASSES = 512;
  const counts = new Uint32Array(CLASSES);
  let total = 0;
  for (let i = 0; i < levelsCentiDb.length; i += 1) {
    const centiDb = levelsCentiDb[i] ?? NO_LEVEL_CENTI_DB;
    if (centiDb === NO_LEVEL_CENTI_DB) continue;
    const half = Math.floor((centiDb + (weightsCentiDb[i % weightsCentiDb.length] ?? 0)) / 50) + 200;
    const at = Math.min(CLASSES - 1, Math.max(0, half));
    counts[at] = (counts[at] ?? 0) + 1;
    total += 1;
  }
  if (total === 0) return null;
  const lowDb = Math.floor(quantile(counts, total, 0.005) / 5) * 5;
  const highDb = Math.ceil((quantile(counts, total, 0.998) + 0.5) / 5) * 5;
  return { lowDb, highDb: Math.max(highDb, lowDb + SHORTEST_DB) };
}

function quantile(counts: Uint32Array, total: number, share: number): number {
  let below = 0;
  for (let at = 0; at < counts.length; at += 1) {
    below += counts[at] ?? 0;
    if (below >= share * total) return (at - 200) / 2;
  }
  return 100;
}
