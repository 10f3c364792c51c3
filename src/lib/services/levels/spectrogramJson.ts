import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Spectrogram } from '#lib/contracts/spectrogram';
import { type SpectrogramColumns } from '#lib/contracts/spectrogramBinary';

/** Columns in the JSON form of the interface: dB, names instead of bits. */
export function spectrogramJson(columns: SpectrogramColumns): Spectrogram {
  const { header, percentiles } = columns;
  const bandCount = header.bands.length;
  return {
    from: formatInstantUtc(header.from),
    to: formatInstantUtc(header.from + header.columns * header.stepSeconds),
    stepSeconds: header.stepSeconds,
    timeZone: header.timeZone,
    source: header.source,
    bands: header.bands,
    seconds: {
      present: [...columns.presentSec],
      valid: [...columns.validSec],
      late: [...columns.lateSec],
    },
    reasons: Array.from(columns.reasonBits, (bits) => namesOf(bits, header.reasons)),
    flags: Array.from(columns.flagBits, (bits) => namesOf(bits, header.flags)),
    LAeq: levelsDb(columns.laeqCentiDb),
    LAFmax: levelsDb(columns.lafmaxCentiDb),
    LAFmin: levelsDb(columns.lafminCentiDb),
    levels: Array.from({ length: header.columns }, (_, at) =>
      levelsDb(columns.levelsCentiDb.subarray(at * bandCount, (at + 1) * bandCount)),
    ),
    percentiles: percentiles && {
      seconds: percentiles.blockSec,
      LA10: levelsDb(percentiles.la10CentiDb),
      LA50: levelsDb(percentiles.la50CentiDb),
      LA90: levelsDb(percentiles.la90CentiDb),
    },
  };
}

function levelsDb(centiDb: Int16Array): (number | null)[] {
  return Array.from(centiDb, (level) => (level === NO_LEVEL_CENTI_DB ? null : centiDbToDb(level)));
}

function namesOf(bits: number, names: readonly string[]): string[] {
  return names.filter((_, bit) => (bits & (1 << bit)) !== 0);
}
