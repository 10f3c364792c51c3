import { listExceedances } from '#db/queries/exceedances';
import { listSettings, type NetworkRow } from '#db/queries/networks';
import { countDirtyWithin, countQuarantineWithin } from '#db/queries/summaryChecks';
import { findLatestDraft } from '#db/queries/summaryDrafts';
import { formatInstantUtc } from '#lib/contracts/common';
import { type StationFigures, type SummaryCheck } from '#lib/contracts/summaryLife';
import { formatCoverage } from '#lib/format/levels';
import { limitMetricText } from '#lib/format/limitMetric';
import { formatPeriod } from '#lib/format/times';
import { doubtsOf } from '../../calibrations/doubts';
import { monthSpan, type MonthSpan } from '../monthSpan';

const MOST_ITEMS = 50;

type Item = SummaryCheck['items'][number];

/** What stands open in a month before it is issued, each with the page where it is decided. Nothing of it hinders: a person decides. */
async function monthChecks(
  network: NetworkRow,
  month: string,
  figures: readonly StationFigures[],
): Promise<SummaryCheck[]> {
  const span = monthSpan(month, await listSettings(network.id));
  const range = { networkId: network.id, fromSec: span.fromSec, toSec: span.toSec };
  const base = `/n/${network.slug}`;
  const period = `from=${formatInstantUtc(span.fromSec)}&to=${formatInstantUtc(span.toSec)}`;
  const [quarantine, doubts, exceedances, dirty] = await Promise.all([
    countQuarantineWithin(range),
    undecidedDoubts(network.id, span),
    listExceedances(
      network.id,
      { fromSec: span.fromSec, toSec: span.toSec, state: 'standing', isAcknowledged: false },
      { limit: MOST_ITEMS + 1, after: null },
    ),
    countDirtyWithin(range),
  ]);
  const low = figures.filter(({ meetsMinimum }) => !meetsMinimum);
  return [
    check(
      'coverage',
      low.map(({ code, coverage }) => ({
        words: `${code}: ${formatCoverage(coverage)} covered, below the minimum`,
        path: `${base}/stations/${code}?${period}`,
      })),
      'Every station has the coverage that it needs',
      ['station is', 'stations are', 'below the minimum coverage'],
    ),
    check(
      'quarantine',
      quarantine.map(({ code, count }) => ({
        words: `${code}: ${count} refused ${count === 1 ? 'record' : 'records'}`,
        path: `${base}/quarantine?station=${code}`,
      })),
      'No refused record of the month waits',
      ['station has', 'stations have', 'refused records that nobody has settled'],
    ),
    check(
      'calibration',
      doubts.map((doubt) => ({
        words: `${doubt.stationCode}, ${doubt.check.serialNumber}: ${formatPeriod(withinMonth(doubt, span), span.timeZone)}`,
        path: `${base}/instruments`,
      })),
      'No stretch of the month is in doubt by a calibration',
      ['stretch is', 'stretches are', 'in doubt by a calibration'],
    ),
    check(
      'exceedances',
      exceedances.map((row) => ({
        words: `${row.stationCode}, ${row.limitName}: ${limitMetricText(row)}, ${formatPeriod({ fromSec: row.startsAtSec, toSec: row.endsAtSec }, span.timeZone)}`,
        path: `${base}/exceedances/${row.id}`,
      })),
      'Every exceedance of the month is acknowledged',
      ['exceedance is', 'exceedances are', 'acknowledged by nobody'],
    ),
    check(
      'recomputation',
      dirty === 0 ? [] : [{ words: `${dirty} marks on quarter-hours`, path: `${base}/health` }],
      'Nothing of the month waits to be recomputed',
      ['stretch waits', 'stretches wait', 'to be recomputed'],
    ),
  ];
}

function check(
  kind: SummaryCheck['kind'],
  items: Item[],
  none: string,
  some: [one: string, several: string, what: string],
): SummaryCheck {
  const [one, several, what] = some;
  const count = items.length > MOST_ITEMS ? `More than ${MOST_ITEMS}` : String(items.length);
  return {
    kind,
    isOpen: items.length > 0,
    words: items.length === 0 ? none : `${count} ${items.length === 1 ? one : several} ${what}`,
    items: items.slice(0, MOST_ITEMS),
  };
}

async function undecidedDoubts(networkId: number, { fromSec, toSec }: MonthSpan) {
  const doubts = await doubtsOf(networkId);
  return doubts.filter(
    (doubt) => doubt.decision === null && doubt.fromSec < toSec && (doubt.toSec ?? Infinity) > fromSec,
  );
}

const withinMonth = (doubt: { fromSec: number; toSec: number | null }, { fromSec, toSec }: MonthSpan) => ({
  fromSec: Math.max(doubt.fromSec, fromSec),
  toSec: Math.min(doubt.toSec ?? toSec, toSec),
});

/** The same for the figures of the revision that is being made, or of the latest. */
export async function checksOfMonth(network: NetworkRow, month: string): Promise<SummaryCheck[]> {
  const draft = await findLatestDraft(network.id, month);
  return monthChecks(network, month, draft?.figures ?? []);
}
