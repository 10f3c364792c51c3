import { bandByNominalHz } from '#lib/acoustics/bands';
import { PeriodAccumulator, type AccumulatedInterval } from '#lib/acoustics/periodStatistics';
import { toCentiDb } from '#lib/acoustics/rounding';
import { thirdsTenthsOfCentiDb, type ThirdsTenths } from '#lib/acoustics/tonality';
import { flagMask, isValid, type FlagName } from '#lib/acoustics/validity';
import { present, readCsv } from './fixtures';

/** One row of the London set as an interval. */
export interface LondonMinute {
  startSec: number;
  interval: AccumulatedInterval;
  isValid: boolean;
  /** As `FLAGS` masks. */
  flags: number;
  windSpeedMs: number;
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
      flags,
      windSpeedMs: Number(windMs),
      isValid: isValid({ flags, windSpeedMs: Number(windMs) }, RULES, false),
      thirdsTenths: thirdsTenthsOfCentiDb(levelsCentiDb, bandIndices),
    };
  });
}

/** The set's minutes gathered into UTC quarter-hours. */
export class LondonQuarters {
  readonly byStartSec = new Map<number, PeriodAccumulator>();

  constructor(minutes: readonly LondonMinute[]) {
    for (const { startSec, interval, isValid: counts } of minutes) {
      const quarterSec = startSec - (startSec % 900);
      const quarter = this.byStartSec.get(quarterSec) ?? new PeriodAccumulator();
      this.byStartSec.set(quarterSec, quarter);
      quarter.add(interval, counts);
    }
  }

  /** Figures of `from <= t < to`, merged from quarter-hours. */
  between(fromSec: number, toSec: number): PeriodAccumulator {
    const whole = new PeriodAccumulator();
    for (let at = fromSec; at < toSec; at += 900) {
      const quarter = this.byStartSec.get(at);
      if (quarter) whole.merge(quarter);
    }
    return whole;
  }
}

/** Epoch seconds of an RFC 3339 instant. */
export function sec(utc: string): number {
  return Date.parse(utc) / 1000;
}

/** Minutes of `from <= t < to`. */
export function minutesBetween(
  minutes: readonly LondonMinute[],
  fromSec: number,
  toSec: number,
): LondonMinute[] {
  return minutes.filter(({ startSec }) => fromSec <= startSec && startSec < toSec);
}

/** First and end instants of the two months, local time (April: to the end of the set). */
export const MONTHS = {
  '2026-03': { fromSec: sec('2026-03-01T00:00Z'), toSec: sec('2026-03-31T23:00Z') },
  '2026-04': { fromSec: sec('2026-03-31T23:00Z'), toSec: sec('2026-04-29T23:00Z') },
} as const;

/** The IANA zone of the set. */
export const ZONE = 'Europe/London';
