import { inTransaction, type Connection } from '#db/queries/connection';
import { listSettings, type NetworkRow } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import { monthFingerprint } from '#db/queries/summaryGrounds';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type StationFigures } from '#lib/contracts/summaryLife';
import { type DataDigest } from '#lib/contracts/summaryManifest';
import { SUMMARY_METRICS, type SummaryMetric } from '#lib/contracts/summaryTemplate';
import { computeMonth } from '../document/computeMonth';
import { monthSpan, type MonthSpan } from '../monthSpan';
import { digestMonth } from '../seal/dataDigest';
import { YearDigests } from '../seal/yearDigest';

/** A month’s figures with the digest of the very intervals that they are of: both of one snapshot. */
export interface MeasuredMonth {
  doc: MonthDocument;
  data: DataDigest;
  /** Of what the figures rest on, to see later whether anything changed. */
  fingerprint: Buffer;
  span: MonthSpan;
  stations: StationRow[];
}

/** Computes a month in one snapshot of the database. `onProgress` is told the stations done, of how many. */
export function measureMonth(
  network: NetworkRow,
  month: string,
  asOf: Date,
  onProgress?: (done: number, of: number) => void,
): Promise<MeasuredMonth> {
  return inTransaction((snapshot) => measureIn(snapshot, network, month, asOf, onProgress), {
    isolationLevel: 'repeatable read',
  });
}

/** The same within a snapshot that the caller has opened. */
export async function measureIn(
  snapshot: Connection,
  network: NetworkRow,
  month: string,
  asOf: Date,
  onProgress: (done: number, of: number) => void = () => undefined,
): Promise<MeasuredMonth> {
  const timeline = await listSettings(network.id, snapshot);
  const span = monthSpan(month, timeline);
  const stations = await listStations(network.id, snapshot);
  const fingerprint = await fingerprintOf(network.id, span, snapshot);
  const intervals = await digestMonth(stations, span, snapshot);
  const year = new YearDigests(month, timeline);
  const doc = await computeMonth(network, month, asOf, {
    conn: snapshot,
    onProgress,
    onEarlier: (code, ground) => year.add(code, ground),
  });
  const data = { ...intervals, year: year.digest() };
  return { doc, data, fingerprint, span, stations };
}

/** Digest of what a month’s figures rest on. */
export function fingerprintOf(networkId: number, span: MonthSpan, conn?: Connection): Promise<Buffer> {
  const ground = {
    networkId,
    yearDate: `${span.month.slice(0, 4)}-01-01`,
    endDate: span.endDate,
    fromSec: span.fromSec,
    toSec: span.toSec,
  };
  return monthFingerprint(ground, conn);
}

/** What is kept of a month beside its files, so that months can be compared without opening them. */
export function keptFigures(doc: MonthDocument): StationFigures[] {
  return doc.stations.map(({ code, name, figures }) => ({
    code,
    name,
    coverage: figures.coverage,
    meetsMinimum: figures.meetsMinimum,
    ...(Object.fromEntries(SUMMARY_METRICS.map((metric) => [metric, figures[metric]])) as Record<
      SummaryMetric,
      number | null
    >),
  }));
}
