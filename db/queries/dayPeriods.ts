import { type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { type PeriodSums } from '#lib/acoustics/periodSums';
import { packBandClasses, unpackBandClasses } from './aggregatePacking';
import { BAND_COLUMNS, rowOfSums, SUMS_COLUMNS, sumsOfCells, type SumsCells } from './aggregateSums';
import { pool, type Connection } from './connection';
import { type Span } from './exclusions';

/** A period never lasts longer: a day with a clock change, and an hour to spare. */
const LONGEST_PERIOD_SEC = 26 * 3600;

/** Names a day, evening or night of a station by the local date on which it begins. */
export interface DayPeriodKey {
  /** Local date `YYYY-MM-DD`. */
  date: string;
  kind: PeriodKind;
}

/** One station's day, evening or night, recomputed wholly from its intervals. One without any interval has no row. */
export interface DayPeriod extends DayPeriodKey {
  fromSec: number;
  toSec: number;
  /** With distributions per band when they were asked for. */
  sums: PeriodSums;
  flagBits: number;
}

/**
 * Periods that lie whole within `fromSec <= t < toSec`, in order of time. `bandClasses: true` also reads the distributions of
 * every band and octave, nearly all of a row.
 */
export async function selectDayPeriods(
  stationId: number,
  fromSec: number,
  toSec: number,
  { bandClasses }: { bandClasses: boolean },
  conn: Connection = pool(),
): Promise<DayPeriod[]> {
  const classes = bandClasses ? 'band_classes' : 'NULL';
  const [rows] = await conn
    .raw(
      `SELECT CAST(local_date AS CHAR), period, starts_at, ends_at, flags, ${classes},
         ${[...SUMS_COLUMNS, ...BAND_COLUMNS].join(', ')}
       FROM day_periods WHERE station_id = ? AND starts_at >= ? AND starts_at < ? AND ends_at <= ? ORDER BY starts_at`,
      [stationId, fromSec, toSec, toSec],
    )
    .options({ rowsAsArray: true });
  return (rows as [string, PeriodKind, number, number, number, Buffer | null, ...SumsCells][]).map(
    ([date, kind, startSec, endSec, flagBits, packed, ...cells]) => ({
      date,
      kind,
      fromSec: startSec,
      toSec: endSec,
      flagBits,
      sums: { ...sumsOfCells(cells), bandClasses: packed && unpackBandClasses(packed) },
    }),
  );
}

/**
 * Replaces the rows that touch any of some spans of time: whatever they were, they are no longer right. `found`: the periods
 * there that have intervals, with distributions per band.
 */
export async function replaceDayPeriods(
  stationId: number,
  spans: readonly Span[],
  found: readonly DayPeriod[],
  conn: Connection,
): Promise<void> {
  for (const { fromSec, toSec } of spans) {
    await conn('day_periods')
      .where({ station_id: stationId })
      .where('starts_at', '<', toSec)
      .where('starts_at', '>', fromSec - LONGEST_PERIOD_SEC)
      .where('ends_at', '>', fromSec)
      .delete();
  }
  if (found.length === 0) return;
  const computedAt = new Date();
  await conn('day_periods')
    .insert(
      found.map((period) => ({
        station_id: stationId,
        local_date: period.date,
        period: period.kind,
        starts_at: period.fromSec,
        ends_at: period.toSec,
        ...rowOfSums(period.sums),
        band_classes: packedClasses(period),
        flags: period.flagBits,
        computed_at: computedAt,
      })),
    )
    // A changed zone can leave a row of the same date and kind elsewhere in time.
    .onConflict(['station_id', 'local_date', 'period'])
    .merge();
}

function packedClasses({ sums, date, kind }: DayPeriod): Buffer {
  if (!sums.bandClasses) throw new Error(`The ${kind} of ${date} has no distributions per band.`);
  return packBandClasses(sums.bandClasses);
}

/** Drops every day period of a station. */
export async function deleteDayPeriods(stationId: number, conn: Connection): Promise<void> {
  await conn('day_periods').where({ station_id: stationId }).delete();
}
