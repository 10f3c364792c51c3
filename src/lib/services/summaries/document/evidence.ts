import { type Connection } from '#db/queries/connection';
import { type NetworkSettings } from '#db/queries/networks';
import { type QuarterHour } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { quarterAt, QUARTER_SEC } from '#lib/time/quarters';
import { currentQuarters } from '../../levels/currentQuarters';
import { settingsOfDate } from '../../levels/datePeriods';
import { type LevelSource } from '../../levels/intervalSums';
import { QuarterSeries } from '../../levels/quarterSeries';
import { type MonthSpan } from '../monthSpan';

/** What is asked of one station’s month. */
export interface StationMonth {
  station: StationRow;
  span: MonthSpan;
  /** The network’s settings in order of their beginning. */
  timeline: NetworkSettings[];
  /** Epoch seconds; time counts as elapsed up to here. */
  nowSec: number;
  conn: Connection;
}

/** A station’s month as it was read once; every figure is taken from it. */
export interface MonthEvidence extends StationMonth {
  source: LevelSource;
  /** Quarter-hours of the calendar month and its last night, with bands. */
  quarters: readonly QuarterHour[];
  /** The same without bands. */
  series: QuarterSeries;
  minimumCoverage: number;
}

/** Reads a station’s quarter-hours of a month. */
export async function readEvidence(month: StationMonth): Promise<MonthEvidence> {
  const { station, span, timeline, conn } = month;
  const source: LevelSource = { station, timeline, validity: 'rules' };
  const whole = {
    fromSec: quarterAt(span.fromSec),
    toSec: quarterAt(Math.max(span.toSec, span.lastNightEndSec) + QUARTER_SEC - 1),
  };
  const quarters = await currentQuarters(source, whole, { bands: true }, conn);
  const { minimumCoverage } = settingsOfDate(span.firstDate, timeline);
  return { ...month, source, quarters, series: seriesOf(source, quarters, conn), minimumCoverage };
}

/** A series that does not add up bands: most figures need none of them. */
export function seriesOf(
  source: LevelSource,
  quarters: readonly QuarterHour[],
  conn: Connection,
): QuarterSeries {
  const rows = quarters.map((row) => ({ ...row, sums: { ...row.sums, bandFraction: null } }));
  return QuarterSeries.of(source, rows, conn);
}
