import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { FLAGS } from '#lib/acoustics/validity';
import type { StoredInterval } from '#db/queries/intervals';
import type { BandLayout, ParsedInterval } from './parseRecord';

/** An interval of the same start, stored or accepted earlier in the same post. */
export type KnownInterval = Omit<StoredInterval, 'startSec' | 'bandSetId' | 'receivedAtSec'>;

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
  bands: BandLayout,
  known: KnownInterval,
): string | null {
  if (record.durationSec !== known.durationSec) return 'seconds';
  if (!record.isLaeqComputed && record.laeqCentiDb !== known.laeqCentiDb) return 'LAeq';
  if (record.flags !== null && record.flags !== (known.flags & ~FLAGS.laeqComputed)) return 'flags';
  for (const [field, name] of OPTIONAL_FIELDS) {
    if (record[field] !== null && record[field] !== known[field]) return name;
  }
  return isSameSpectrum(record.levelsCentiDb, bands, known) ? null : 'levels';
}

function isSameSpectrum(levelsCentiDb: Int16Array, bands: BandLayout, known: KnownInterval): boolean {
  const isSameSet = bands.indices === known.bandIndices;
  return levelsCentiDb.every((level, at) => {
    if (level === NO_LEVEL_CENTI_DB) return true;
    if (bands.fraction !== known.bandFraction) return false;
    const place = isSameSet ? at : known.bandIndices.indexOf(bands.indices[at] ?? NaN);
    return level === known.levelsCentiDb[place];
  });
}
