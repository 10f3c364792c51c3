import type { Connection } from '#db/queries/connection';
import type { ExceedanceRow } from '#db/queries/exceedances';
import { settingsAt, type NetworkRow } from '#db/queries/networks';
import { config } from '#lib/config/index';
import { formatInstantUtc } from '#lib/contracts/common';
import { formatCoverage } from '#lib/format/levels';
import { limitValueText } from '#lib/format/limitMetric';
import { formatPeriod, formatZone } from '#lib/format/times';
import { exceedanceView } from '#lib/services/exceedances/view';
import type { ChangeWords } from './describeChange';

/** What is shown of the station around the window. */
const MARGIN_SEC = 3600;

/** Puts an exceedance as it stands into words; times in the network's zone, which is named. */
export async function describeExceedance(
  row: ExceedanceRow,
  network: NetworkRow,
  conn: Connection,
): Promise<ChangeWords> {
  const { startsAtSec, endsAtSec, stationCode } = row;
  const { limit, descriptor, unit, threshold, level, excess, coverage, stationName } = exceedanceView(row);
  const { timeZone } = await settingsAt(network.id, startsAtSec, conn);
  const window = { fromSec: startsAtSec, toSec: endsAtSec };
  const base = `${config().origin}/n/${network.slug}`;
  const [from, to] = [formatInstantUtc(startsAtSec - MARGIN_SEC), formatInstantUtc(endsAtSec + MARGIN_SEC)];
  return {
    station: `${stationCode} ${stationName}`,
    headline: `above the limit by ${limitValueText(excess, unit)}`,
    because: null,
    facts: [
      ['Limit', `${limit.name}: ${descriptor} above ${limitValueText(threshold, unit)}`],
      ['Level', limitValueText(level, unit)],
      ['Period', `${formatPeriod(window, timeZone)}, ${formatZone(timeZone, window)}`],
      ['Coverage', formatCoverage(coverage)],
    ],
    exceedanceUrl: `${base}/exceedances/${row.id}`,
    stripUrl: `${base}/stations/${stationCode}?from=${from}&to=${to}`,
  };
}
