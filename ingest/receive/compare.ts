import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { FLAGS } from '#lib/acoustics/validity';
import type { ParsedInterval } from './parseRecord';

/** An interval of the same start, stored or accepted earlier in the same post. */
export interface KnownInterval {
  durationSec: number;
  laeqCentiDb: number;
  lafmaxCentiDb: number | null;
  lafminCentiDb: number | null;
  lceqCentiDb: number | null;
  lcpeakCentiDb: number | null;
  bandIndices: Int8Array;
  levelsCentiDb: Int16Array;
  flags: number;
  windSpeedMs: number | null;
  windDirectionDeg: number | null;
  temperatureC: number | null;
  batteryV: number | null;
}

const OPTIONAL_FIELDS = [
  ['lafmaxCentiDb', 'LAFmax'],
  ['lafminCentiDb', 'LAFmin'],
  ['lceqCentiDb', 'LCeq'],
  ['lcpeakCentiDb', 'LCpeak'],
  ['windSpeedMs', 'windSpeed'],
  ['windDirectionDeg', 'windDirection'],
  ['temperatureC', 'temperature'],
  ['batteryV', 'battery'],
] as const;

/**
 * First field in which a record differs from what is known for its start, compared as stored; null when it says the same.
 * What the record leaves out is not compared.
 */
export function findDifference(
  record: ParsedInterval,
  bandIndices: Int8Array,
  known: KnownInterval,
): string | null {
  if (record.durationSec !== known.durationSec) return 'seconds';
  if (!record.isLaeqComputed && record.laeqCentiDb !== known.laeqCentiDb) return 'LAeq';
  if (record.flags !== null && record.flags !== (known.flags & ~FLAGS.laeqComputed)) return 'flags';
  for (const [field, name] of OPTIONAL_FIELDS) {
    if (record[field] !== null && record[field] !== known[field]) return name;
  }
  return isSameSpectrum(record.levelsCentiDb, bandIndices, known) ? null : 'levels';
}

function isSameSpectrum(levelsCentiDb: Int16Array, bandIndices: Int8Array, known: KnownInterval): boolean {
  if (bandIndices === known.bandIndices) {
    return levelsCentiDb.every(
      (level, at) => level === NO_LEVEL_CENTI_DB || level === known.levelsCentiDb[at],
    );
  }
  return levelsCentiDb.every(
    (level, at) =>
      level === NO_LEVEL_CENTI_DB ||
      level === known.levelsCentiDb[known.bandIndices.indexOf(bandIndices[at] ?? NaN)],
  );
}
