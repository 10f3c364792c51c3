import { type Band } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import type { PercentileColumns } from '#lib/contracts/spectrogramBinary';

/**
 * A stretch of a station's measurements in equal time steps, as the strip works with it. Levels are hundredths of a dB,
 * −32768 = none. A column shows what was measured, counted in figures or not; its seconds and reasons say which.
 */
export interface StripColumns {
  /** Start of the first column, epoch seconds. */
  fromSec: number;
  /** Length of every column in seconds. */
  stepSec: number;
  count: number;
  bands: readonly Band[];
  laeqCentiDb: Int16Array;
  lafmaxCentiDb: Int16Array;
  /** Seconds that intervals cover, valid or not. */
  presentSec: Uint32Array;
  /** Seconds that count in statistics. */
  validSec: Uint32Array;
  /** Why seconds do not count: bit n is `INVALIDITY_REASONS[n]`. */
  reasonBits: Uint16Array;
  /** Interval flags seen, as `FLAGS` masks. */
  flagBits: Uint16Array;
  /** Seconds whose intervals arrived late. */
  lateSec: Uint32Array;
  /** Unweighted band levels, column after column. */
  levelsCentiDb: Int16Array;
  /** Null where nothing is known of them. */
  percentiles: PercentileColumns | null;
}

/** End of the last column, epoch seconds. */
export function endOfColumnsSec(columns: StripColumns): number {
  return columns.fromSec + columns.count * columns.stepSec;
}

/** Index of the column that an instant falls in, or null outside. */
export function columnAt(columns: StripColumns, sec: number): number | null {
  const index = Math.floor((sec - columns.fromSec) / columns.stepSec);
  return index >= 0 && index < columns.count ? index : null;
}

/** Columns of nothing, to be filled. */
export function emptyColumns(
  fromSec: number,
  stepSec: number,
  count: number,
  bands: readonly Band[],
): StripColumns {
  return {
    fromSec,
    stepSec,
    count,
    bands,
    laeqCentiDb: new Int16Array(count).fill(NO_LEVEL_CENTI_DB),
    lafmaxCentiDb: new Int16Array(count).fill(NO_LEVEL_CENTI_DB),
    presentSec: new Uint32Array(count),
    validSec: new Uint32Array(count),
    reasonBits: new Uint16Array(count),
    flagBits: new Uint16Array(count),
    lateSec: new Uint32Array(count),
    levelsCentiDb: new Int16Array(count * bands.length).fill(NO_LEVEL_CENTI_DB),
    percentiles: null,
  };
}
