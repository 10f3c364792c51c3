import { pool } from '#db/queries/connection';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import type { StationRow } from '#db/queries/stations';
import { flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { bandIndicesOf, hasMixedFractions, inDb, levelsIn, nominalHzOf } from './columns';
import { MixedBandFractions } from './list';

/** Most intervals in one file: a month of minutes and more, a day of seconds. */
export const MOST_CSV_INTERVALS = 100_000;

/** The period holds more intervals than one file may have. */
export class TooManyIntervals extends Error {
  constructor() {
    super(`The period holds more than ${MOST_CSV_INTERVALS} intervals; ask for a shorter one.`);
    this.name = 'TooManyIntervals';
  }
}

const LEADING = ['start', 'seconds', 'LAeq', 'LAFmax', 'LAFmin', 'LCeq', 'LCpeak'];
const TRAILING = ['flags', 'windSpeed', 'windDirection', 'temperature', 'battery'];

/**
 * Intervals that begin in `fromSec <= t < toSec` as CSV (RFC 4180) in the contract's columns. The same file uploaded again is
 * all known.
 * @throws {MixedBandFractions | TooManyIntervals}
 */
export async function intervalsCsv(
  station: StationRow,
  period: { fromSec: number; toSec: number },
): Promise<string> {
  const overlapping = await selectIntervals(
    station.id,
    period.fromSec,
    period.toSec,
    pool(),
    MOST_CSV_INTERVALS + 2,
  );
  const intervals = overlapping.filter(({ startSec }) => startSec >= period.fromSec);
  if (intervals.length > MOST_CSV_INTERVALS) throw new TooManyIntervals();
  if (hasMixedFractions(intervals)) throw new MixedBandFractions();
  const indices = bandIndicesOf(intervals);
  const header = [...LEADING, ...nominalHzOf(intervals, indices), ...TRAILING].join(',');
  const lines = intervals.map((interval) => lineOf(interval, indices));
  return [header, ...lines, ''].join('\r\n');
}

function lineOf(interval: StoredInterval, indices: readonly number[]): string {
  const cells = [
    formatInstantUtc(interval.startSec),
    interval.durationSec,
    interval.laeqCentiDb / 100,
    inDb(interval.lafmaxCentiDb),
    inDb(interval.lafminCentiDb),
    inDb(interval.lceqCentiDb),
    inDb(interval.lcpeakCentiDb),
    ...levelsIn(interval, indices),
    flagNames(interval.flags).join(' '),
    interval.windSpeedMs,
    interval.windDirectionDeg,
    interval.temperatureC,
    interval.batteryV,
  ];
  return cells.map((cell) => cell ?? '').join(',');
}
