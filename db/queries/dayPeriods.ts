import { type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { type PeriodSums } from '#lib/acoustics/periodSums';
import { packBandClasses, unpackBandClasses } from './aggregatePacking';
import {
  BAND_COLUMNS,
  cellsOfSums,
  instantCell,
  SUMS_COLUMNS,
  sumsOfCells,
  type SumsCells,
} from './aggregateSums';
import { pool, type Connection } from './connection';
import { type Span } from './exclusions';
import { runPrepared } from './prepared';
import { insertPrepared } from './preparedInsert';

/** A period never lasts longer: a day with a clock change, and an hour to spare. */
const LONGEST_PERIOD_SEC = 26 * 3600;

const INSERTED_COLUMNS = [
  'station_id',
  'local_date',
  'period',
  'starts_at',
  'ends_at',
  'flags',
  'computed_at',
  'band_classes',
  ...SUMS_COLUMNS,
  ...BAND_COLUMNS,
];

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

/** Rows of a part, of which two are held at once: fifty days, 2.5 MB with distributions per band. */
const ROWS_A_READ = 150;

/**
 * Periods that lie whole within `fromSec <= t < toSec`, in order of time, read part by part: years never lie in memory at once.
 * `bandClasses: true` also reads the distributions of every band and octave, nearly all of a row.
 */
export async function* eachDayPeriod(
  stationId: number,
  { fromSec, toSec }: Span,
  options: { bandClasses: boolean },
  conn: Connection = pool(),
): AsyncGenerator<DayPeriod[]> {
  let reading = selectDayPeriods(stationId, { fromSec, toSec }, options, conn);
  for (;;) {
    const part = await reading;
    const last = part.length < ROWS_A_READ ? undefined : part.at(-1);
    // Read while the caller sums this part. Where a zone has changed two may begin together; of those only the first would be
    // counted anyway.
    if (last) {
      reading = selectDayPeriods(stationId, { fromSec: last.fromSec + 1, toSec }, options, conn);
      // Told when it is awaited, which it is not once the caller has failed itself.
      reading.catch(() => undefined);
    }
    yield part;
    if (!last) return;
  }
}

function selection(withClasses: boolean): string {
  return `SELECT CAST(local_date AS CHAR), period, starts_at, ends_at, flags, ${withClasses ? 'band_classes' : 'NULL'},
      ${[...SUMS_COLUMNS, ...BAND_COLUMNS].join(', ')}
    FROM day_periods WHERE station_id = ? AND starts_at >= ? AND starts_at < ? AND ends_at <= ?
    ORDER BY starts_at LIMIT ${ROWS_A_READ}`;
}

async function selectDayPeriods(
  stationId: number,
  { fromSec, toSec }: Span,
  { bandClasses }: { bandClasses: boolean },
  conn: Connection,
): Promise<DayPeriod[]> {
  const statement = selection(bandClasses);
  const [rows] = await runPrepared(conn, [{ statement, cells: [stationId, fromSec, toSec, toSec] }]);
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

/** Drops a station's rows that touch any of some spans of time: whatever they were, they are no longer right. */
export async function deletePeriodsTouching(
  stationId: number,
  spans: readonly Span[],
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
}

/** Adds periods of a station that have intervals, with distributions per band. */
export async function insertDayPeriods(
  stationId: number,
  periods: readonly DayPeriod[],
  conn: Connection,
): Promise<void> {
  const computedAt = instantCell(new Date());
  await insertPrepared(conn, {
    table: 'day_periods',
    columns: INSERTED_COLUMNS,
    rows: periods.map((period) => {
      const { date, kind, fromSec, toSec, flagBits, sums } = period;
      const classes = packedClasses(period);
      return [stationId, date, kind, fromSec, toSec, flagBits, computedAt, classes, ...cellsOfSums(sums)];
    }),
    // A changed zone can leave a row of the same date and kind elsewhere in time.
    tail: `ON DUPLICATE KEY UPDATE ${INSERTED_COLUMNS.map((name) => `${name} = VALUES(${name})`).join(', ')}`,
  });
}

function packedClasses({ sums, date, kind }: DayPeriod): Buffer {
  if (!sums.bandClasses) throw new Error(`The ${kind} of ${date} has no distributions per band.`);
  return packBandClasses(sums.bandClasses);
}

/**
 * Marks for recomputation the last computed quarter-hour within a period of every station of a network that has one and no row of
 * that period. @returns how many.
 */
export async function markUncomputedPeriod(
  networkId: number,
  { date, kind, fromSec, toSec }: DayPeriodKey & Span,
  conn: Connection = pool(),
): Promise<number> {
  // Not one INSERT … SELECT: that would hold the stations that it reads against their monitors.
  const [rows] = await conn.raw(
    `SELECT q.station_id, MAX(q.starts_at) AS quarter_starts_at, ? AS marked_at FROM stations s
     JOIN quarter_hours q ON q.station_id = s.id AND q.starts_at >= ? AND q.starts_at < ?
     WHERE s.network_id = ? AND NOT EXISTS
       (SELECT 1 FROM day_periods d WHERE d.station_id = s.id AND d.local_date = ? AND d.period = ?)
     GROUP BY q.station_id`,
    [Math.floor(Date.now() / 1000), fromSec, toSec, networkId, date, kind],
  );
  const marks = rows as Record<string, number>[];
  if (marks.length > 0) await conn('dirty_marks').insert(marks);
  return marks.length;
}

/** Drops every day period of a station that begins at `fromSec` or later. */
export async function deleteDayPeriods(stationId: number, fromSec: number, conn: Connection): Promise<void> {
  await conn('day_periods').where({ station_id: stationId }).where('starts_at', '>=', fromSec).delete();
}
