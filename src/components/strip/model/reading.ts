import { type Band } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type InvalidityReason } from '#lib/acoustics/validity';
import { type Corner } from './dragSelection';
import { reasonsOfMask } from './lanes';
import { columnAt, type StripColumns } from './stripColumns';

/** What the strip holds at the cursor. */
export interface Reading {
  fromSec: number;
  toSec: number;
  /** Null: no data. */
  laeqDb: number | null;
  lafmaxDb: number | null;
  /** Exceedance levels of the block of time that it begins in; null where there are none. */
  percentiles: { blockSec: number; la10Db: number; la50Db: number; la90Db: number } | null;
  /** Null: the cursor names no band. */
  band: Band | null;
  bandLevelDb: number | null;
  reasons: InvalidityReason[];
}

/** The column under the cursor in the first layer that holds it; null where nothing is fetched. `weightsCentiDb`: added to the band's level. */
export function readingAt(
  layers: readonly StripColumns[],
  cursor: Corner,
  weightsCentiDb: readonly number[],
): Reading | null {
  for (const columns of layers) {
    const at = columnAt(columns, cursor.sec);
    if (at === null) continue;
    const fromSec = columns.fromSec + at * columns.stepSec;
    const band = cursor.bandAt === null ? null : (columns.bands[cursor.bandAt] ?? null);
    const bandCentiDb =
      cursor.bandAt === null ? undefined : columns.levelsCentiDb[at * columns.bands.length + cursor.bandAt];
    const weightDb = (weightsCentiDb[cursor.bandAt ?? 0] ?? 0) / 100;
    const bandDb = band && dbOf(bandCentiDb);
    return {
      fromSec,
      toSec: fromSec + columns.stepSec,
      laeqDb: dbOf(columns.laeqCentiDb[at]),
      lafmaxDb: dbOf(columns.lafmaxCentiDb[at]),
      percentiles: percentilesAt(columns, at),
      band,
      bandLevelDb: bandDb === null ? null : bandDb + weightDb,
      reasons: reasonsOfMask(columns.reasonBits[at] ?? 0),
    };
  }
  return null;
}

/** How far one level lies above another, dB; null where one of them is missing. */
export function differenceDb(levelDb: number | null, fromDb: number | null): number | null {
  return levelDb === null || fromDb === null ? null : levelDb - fromDb;
}

function percentilesAt({ percentiles }: StripColumns, at: number): Reading['percentiles'] {
  if (!percentiles) return null;
  const [la10Db, la50Db, la90Db] = [
    dbOf(percentiles.la10CentiDb[at]),
    dbOf(percentiles.la50CentiDb[at]),
    dbOf(percentiles.la90CentiDb[at]),
  ];
  if (la10Db === null || la50Db === null || la90Db === null) return null;
  return { blockSec: percentiles.blockSec, la10Db, la50Db, la90Db };
}

function dbOf(centiDb: number | undefined): number | null {
  return centiDb === undefined || centiDb === NO_LEVEL_CENTI_DB ? null : centiDb / 100;
}
