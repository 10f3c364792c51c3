import { pool, type Connection } from '#db/queries/connection';
import { listSettings } from '#db/queries/networks';
import { QuarterSeries } from '#lib/services/levels/quarterSeries';
import { type OverviewQuery } from './overview';
import { stepsOf } from './tableSteps';

/** Distributions of a longer period are too many to read for a table that stands folded up. */
const LONGEST_SEC = 31 * 86_400 + 7200;

/** Exceedance levels of a row of the table beside the strip; null where there are too few samples. */
export interface RowPercentiles {
  la10Db: number | null;
  la50Db: number | null;
  la90Db: number | null;
}

/** LA10, LA50 and LA90 of each row of a period's table, in the rows' order; null for a period of more than a month. */
export async function tablePercentiles(
  query: OverviewQuery,
  conn: Connection = pool(),
): Promise<RowPercentiles[] | null> {
  const { station, fromSec, toSec, nowSec } = query;
  if (toSec - fromSec > LONGEST_SEC) return null;
  const timeline = await listSettings(station.networkId, conn);
  const { steps } = stepsOf(query, timeline, nowSec);
  const series = await QuarterSeries.read({ station, timeline, validity: 'rules' }, { fromSec, toSec }, conn);
  const rows: RowPercentiles[] = [];
  for (const step of steps) {
    const levels = await series.levels(step);
    rows.push({
      la10Db: levels.exceedanceLevelDb(10),
      la50Db: levels.exceedanceLevelDb(50),
      la90Db: levels.exceedanceLevelDb(90),
    });
  }
  return rows;
}
