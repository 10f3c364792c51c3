import { listCalibrations } from '#db/queries/calibrations';
import { countOfWindowsWithin } from '#db/queries/complaints';
import { pool, type Connection } from '#db/queries/connection';
import { listExceedances, type ExceedanceRow } from '#db/queries/exceedances';
import { listSettings, type NetworkRow } from '#db/queries/networks';
import { listStations } from '#db/queries/stations';
import { hasData } from '#db/queries/summaries';
import { formatInstantUtc } from '#lib/contracts/common';
import { MONTH_DOCUMENT_FORM, type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import { type Span } from '../../levels/spans';
import { monthSpan, stoodWithin } from '../monthSpan';
import { conventionsOf } from './conventions';
import { limitsInForce } from './compliance';
import { stationDocument, type SharedEvidence } from './stationDocument';

/** Far more than a month’s windows of a hundred stations can be. */
const MOST_EXCEEDANCES = 1_000_000;

export interface ComputeOptions {
  /** Told after each station, so that whoever waits sees how far it is. */
  onProgress?: (done: number, of: number) => void;
  /** Told of each station what its year so far rests on before the month. */
  onEarlier?: SharedEvidence['onEarlier'];
  conn?: Connection;
}

/**
 * A network’s month: everything that its files say, current as of `asOf`, by one computation that goes station by station. Stations
 * that stood in the month are listed even without data: missing is told.
 * @throws RangeError for a month that has not begun by `asOf`.
 */
export async function computeMonth(
  network: NetworkRow,
  month: string,
  asOf: Date,
  { onProgress, onEarlier = () => undefined, conn = pool() }: ComputeOptions = {},
): Promise<MonthDocument> {
  const nowSec = Math.floor(asOf.getTime() / 1000);
  const timeline = await listSettings(network.id, conn);
  const span = monthSpan(month, timeline);
  if (nowSec <= span.fromSec) throw new RangeError(`${month} has not begun.`);
  const civil = { fromSec: span.fromSec, toSec: span.toSec };
  const stations = await listStations(network.id, conn);
  const limits = await limitsInForce({
    networkId: network.id,
    stations,
    timeline,
    month: civil,
    nowSec,
    conn,
  });
  const calibrations = await listCalibrations(network.id, null, conn);
  const shared: SharedEvidence = {
    limits,
    exceedances: await exceedancesOf(network.id, civil, conn),
    calibrations: calibrations.filter(({ withdrawnAt }) => withdrawnAt === null),
    onEarlier,
  };
  const found: DocumentStation[] = [];
  for (const [at, station] of stations.entries()) {
    const stood = stoodWithin(station, span);
    // What neither stood nor measured then need not be computed.
    if (stood || (await hasData(station.id, civil, conn))) {
      const one = await stationDocument({ station, span, timeline, nowSec, conn }, shared);
      if (stood || one.figures.LAeq !== null) found.push(one);
    }
    onProgress?.(at + 1, stations.length);
  }
  return {
    form: MONTH_DOCUMENT_FORM,
    network: { slug: network.slug, name: network.name },
    month,
    timeZone: span.timeZone,
    from: formatInstantUtc(span.fromSec),
    to: formatInstantUtc(span.toSec),
    nightsTo: formatInstantUtc(span.lastNightEndSec),
    isToDate: nowSec < span.lastNightEndSec,
    generatedAt: asOf.toISOString(),
    conventions: conventionsOf(timeline, span),
    complaints: await countOfWindowsWithin(network.id, span.fromSec, span.toSec, conn),
    limits: limits.map(({ view }) => view),
    stations: found,
  };
}

/** Exceedances whose window begins in a month, in order of time. */
async function exceedancesOf(networkId: number, month: Span, conn: Connection): Promise<ExceedanceRow[]> {
  const rows = await listExceedances(networkId, month, { limit: MOST_EXCEEDANCES, after: null }, conn);
  return rows.filter(({ startsAtSec }) => startsAtSec >= month.fromSec).reverse();
}
