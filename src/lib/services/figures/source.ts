import { type Connection } from '#db/queries/connection';
import { type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { type Covered } from '#lib/contracts/figureSheet';
import { coverageOf } from '../levels/figures';
import { type QuarterSeries } from '../levels/quarterSeries';
import { type Span } from '../levels/spans';

/** What the figures of one period are taken from. */
export interface SheetSource {
  station: StationRow;
  period: Span;
  timeline: NetworkSettings[];
  timeZone: string;
  minimumCoverage: number;
  /** Epoch seconds; a period counts as elapsed up to here. */
  nowSec: number;
  /** Quarter-hours of every date that the period touches. */
  series: QuarterSeries;
  /** Single intervals that begin before are no longer kept, epoch seconds. */
  keptFromSec: number;
  conn: Connection;
}

/** Coverage of `validSec` within a stretch of time, as far as it has elapsed. */
export function coveredOf(
  { nowSec, minimumCoverage }: Pick<SheetSource, 'nowSec' | 'minimumCoverage'>,
  span: Span,
  validSec: number,
): Covered {
  const { coverage, meetsMinimum } = coverageOf({ validSec, excludedSec: 0 }, span, minimumCoverage, nowSec);
  return { coverage, meetsMinimum };
}
