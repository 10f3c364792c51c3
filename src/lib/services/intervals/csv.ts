import { countBandSets } from '#db/queries/bandSets';
import { inSnapshot, type Connection } from '#db/queries/connection';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import type { StationRow } from '#db/queries/stations';
import { flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { keptFromSecOf, requireKept } from '../retention/kept';
import { bandColumns, inDb, type BandColumns } from './columns';

/** Most intervals in one file: two months of minutes, a day of seconds. */
const MOST_CSV_INTERVALS = 100_000;
/** Rows written between two turns of the event loop. */
const PAGE = 5000;

/** A period cannot be one file; the message says why. */
export class NotOneFile extends Error {
  override readonly name = 'NotOneFile';
}

/** Columns before and after those of the bands. */
export const CSV_LEADING = ['start', 'seconds', 'LAeq', 'LAFmax', 'LAFmin', 'LCeq', 'LCpeak'];
export const CSV_TRAILING = ['flags', 'windSpeed', 'windDirection', 'temperature', 'battery'];

interface Period {
  fromSec: number;
  toSec: number;
}

/**
 * Intervals that begin in `fromSec <= t < toSec` as CSV (RFC 4180) in the contract's columns, as of one moment. The same file
 * uploaded again is all known.
 * @throws {NotOneFile}
 * @throws {SealedError} for a period that reaches back to where single intervals are no longer kept: a file would not tell what it lacks.
 */
export async function intervalsCsv(station: StationRow, period: Period): Promise<string> {
  return inSnapshot(async (snapshot) => {
    requireKept(period.fromSec, await keptFromSecOf(station.id, snapshot));
    const columns = await columnsOf(station, period, snapshot);
    const lines = [[...CSV_LEADING, ...columns.nominalHz, ...CSV_TRAILING].join(',')];
    for (let fromSec = period.fromSec; ;) {
      const page = await selectIntervals(station.id, fromSec, period.toSec, snapshot, PAGE);
      for (const interval of page) {
        if (interval.startSec >= period.fromSec) lines.push(lineOf(interval, columns));
      }
      const last = page.at(-1);
      if (!last || page.length < PAGE) break;
      fromSec = last.startSec + last.durationSec;
    }
    return [...lines, ''].join('\r\n');
  });
}

async function columnsOf(station: StationRow, period: Period, conn: Connection): Promise<BandColumns> {
  const counted = await countBandSets(station.id, period, MOST_CSV_INTERVALS + 1, conn);
  if (counted.reduce((sum, { count }) => sum + count, 0) > MOST_CSV_INTERVALS) {
    throw new NotOneFile(
      `The period holds more than ${MOST_CSV_INTERVALS} intervals; ask for a shorter one.`,
    );
  }
  const fractions = new Set(counted.map(({ set }) => set.fraction));
  if (fractions.size > 1) {
    throw new NotOneFile(
      'The period holds octave and one-third-octave intervals; ask for the two stretches apart.',
    );
  }
  const [fraction = station.bandFraction] = fractions;
  return bandColumns(
    fraction,
    counted.map(({ set }) => set.indices),
  );
}

function lineOf(interval: StoredInterval, columns: BandColumns): string {
  const cells = [
    formatInstantUtc(interval.startSec),
    interval.durationSec,
    interval.laeqCentiDb / 100,
    inDb(interval.lafmaxCentiDb),
    inDb(interval.lafminCentiDb),
    inDb(interval.lceqCentiDb),
    inDb(interval.lcpeakCentiDb),
    ...columns.levelsOf(interval),
    flagNames(interval.flags).join(' '),
    interval.windSpeedMs,
    interval.windDirectionDeg,
    interval.temperatureC,
    interval.batteryV,
  ];
  return cells.map((cell) => cell ?? '').join(',');
}
