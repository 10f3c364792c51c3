import { bandByNominalHz } from '#lib/acoustics/bands';
import { type AccumulatedInterval } from '#lib/acoustics/periodStatistics';
import { toCentiDb } from '#lib/acoustics/rounding';
import { thirdsTenthsOfCentiDb, type ThirdsTenths } from '#lib/acoustics/tonality';
import { flagMask, isValid, type FlagName } from '#lib/acoustics/validity';
import { present, readCsv } from './fixtures';

/** One row of the London set as an interval. */
export interface LondonMinute {
  startSec: number;
  interval: AccumulatedInterval;
  isValid: boolean;
  thirdsTenths: ThirdsTenths;
}

/** The London set's own flag letters. */
const FLAG_OF_LETTER: Readonly<Record<string, FlagName>> = { C: 'calibration', W: 'wind', O: 'overload' };

/** The rules that its expected values were made with. One row is left out for its wind speed alone, without a flag. */
const RULES = { maximumWindSpeedMs: 5, excludeRain: false };

/** Reads the 60 days of 1-minute thirds, 20 Hz–20 kHz, of fixtures/london. */
export function readLondonMinutes(): LondonMinute[] {
  const [header, ...rows] = readCsv('london/input_london.csv.gz');
  const nominalHz = present(header)
    .slice(5)
    .map((name) => Number(name.slice(1)));
  const bandIndices = Int8Array.from(nominalHz, (hz) => present(bandByNominalHz(3, hz), `band ${hz}`).index);
  return rows.map((row) => {
    const [startUtc = '', letter = '', windMs = '', laeq = '', lafmax = ''] = row;
    const levelsCentiDb = Int16Array.from(row.slice(5), (level) => toCentiDb(Number(level)));
    const flag = FLAG_OF_LETTER[letter];
    const flags = flag ? flagMask([flag]) : 0;
    return {
      startSec: Date.parse(startUtc) / 1000,
      interval: {
        durationSec: 60,
        sampleSec: 60,
        laeqCentiDb: toCentiDb(Number(laeq)),
        lafmaxCentiDb: toCentiDb(Number(lafmax)),
        lafminCentiDb: null,
        lceqCentiDb: null,
        lcpeakCentiDb: null,
        bandFraction: 3,
        levelsCentiDb,
        bandIndices,
      },
      isValid: isValid({ flags, windSpeedMs: Number(windMs) }, RULES, false),
      thirdsTenths: thirdsTenthsOfCentiDb(levelsCentiDb, bandIndices),
    };
  });
}
