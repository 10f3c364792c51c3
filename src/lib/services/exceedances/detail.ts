import { listExceedanceMails } from '#db/queries/exceedanceMails';
import { listRevisions } from '#db/queries/exceedanceRevisions';
import { findExceedance, type ExceedanceRow } from '#db/queries/exceedances';
import { findLimit, type LimitVersion } from '#db/queries/limits';
import { listSettings, pickSettings } from '#db/queries/networks';
import { findStationById, type StationRow } from '#db/queries/stations';
import { toTenths } from '#lib/acoustics/rounding';
import type { ExceedanceMail, ExceedanceRevision } from '#lib/contracts/exceedanceDetail';
import type { ExceedanceDetail } from '#lib/contracts/exceedances';
import type { WindowStrip } from '#lib/contracts/windowStrip';
import { madeBy } from '../calibrations/madeBy';
import { periodFigures } from '../levels/figures';
import { statisticsOf } from '../levels/statistics';
import { readLimit } from '../limits/list';
import { windowStrip } from '../strip/windowStrip';
import { windSources } from '../weather/windSources';
import { windowConditions } from './conditions';
import { eventsCsv, windowEvents } from './events';
import { limitWindOf } from './limitWind';
import { neighboursOf } from './neighbours';
import { comparedSpectrum } from './spectrum';
import { exceedanceView } from './view';

/** Who reads an exceedance of a network. */
export interface ExceedanceReader {
  networkId: number;
  /** Addresses are personal data: operators only. */
  seesRecipients: boolean;
  nowSec: number;
}

/** An exceedance with all that explains it; null when the network has none of this number. */
export async function readExceedance(id: number, reader: ExceedanceReader): Promise<ExceedanceDetail | null> {
  const row = await findExceedance(reader.networkId, id);
  if (!row) return null;
  const station = await stationOf(row);
  const [limits, window, revisions, mails] = await Promise.all([
    limitsOf(row, reader),
    windowOf(row, station, reader.nowSec),
    revisionsOf(row.id),
    mailsOf(row.id, reader.seesRecipients),
  ]);
  return { ...exceedanceView(row), ...limits, ...window, revisions, mails };
}

/** The events of an exceedance's window as CSV; null when the network has none of this number, or its limit is on no events. */
export async function exceedanceEventsCsv(networkId: number, id: number): Promise<string | null> {
  const row = await findExceedance(networkId, id);
  if (!row) return null;
  const station = await stationOf(row);
  const window = { fromSec: row.startsAtSec, toSec: row.endsAtSec };
  const version = await versionOf(row, networkId);
  const events = await windowEvents(version, station, window, await listSettings(networkId));
  return events && eventsCsv(row.stationCode, events);
}

/** The levels around an exceedance's window for a small drawing; null when the network has none of this number. */
export async function stripOfExceedance(
  id: number,
  { networkId, nowSec }: ExceedanceReader,
): Promise<WindowStrip | null> {
  const row = await findExceedance(networkId, id);
  if (!row) return null;
  const window = { fromSec: row.startsAtSec, toSec: row.endsAtSec };
  return windowStrip(await stationOf(row), window, nowSec);
}

async function stationOf({ id, stationId }: ExceedanceRow): Promise<StationRow> {
  const station = await findStationById(stationId);
  if (!station) throw new Error(`Exceedance ${id} has no station.`);
  return station;
}

/** The version that an exceedance is judged by, with all that it compares. */
async function versionOf(
  { id, limitId, limitVersionId }: ExceedanceRow,
  networkId: number,
): Promise<LimitVersion> {
  const version = (await findLimit(networkId, limitId)).find((one) => one.id === limitVersionId);
  if (!version) throw new Error(`Exceedance ${id} has no limit.`);
  return version;
}

async function limitsOf({ id, limitId, limitVersion }: ExceedanceRow, reader: ExceedanceReader) {
  const detail = await readLimit(reader.networkId, limitId, reader.seesRecipients);
  const limitThen = detail?.versions.find(({ version }) => version === limitVersion);
  if (!detail || !limitThen) throw new Error(`Exceedance ${id} has no limit.`);
  return { limitThen, limitNow: { version: detail.limit.version, state: detail.limit.state } };
}

async function windowOf(row: ExceedanceRow, station: StationRow, nowSec: number) {
  const window = { fromSec: row.startsAtSec, toSec: row.endsAtSec };
  const timeline = await listSettings(station.networkId);
  const settings = pickSettings(timeline, window.fromSec);
  const periodOfStation = await periodFigures({ station, timeline, nowSec, ...window });
  const statistics = statisticsOf(periodOfStation, { station });
  const fraction = periodOfStation.levels.sums.bandFraction ?? station.bandFraction;
  const version = await versionOf(row, station.networkId);
  const [spectrum, conditions, neighbours, instruments, wind, limitWind, events] = await Promise.all([
    comparedSpectrum(station, window, { statistics, fraction }, timeline),
    windowConditions(station, window, settings),
    neighboursOf(station, window, timeline, nowSec),
    madeBy(station, window),
    windSources(station.id, window),
    limitWindOf(version, station, window, timeline),
    windowEvents(version, station, window, timeline),
  ]);
  const { seconds, coverage, meetsMinimum, sampleSeconds, LAeq, LAFmax, LAN } = statistics;
  return {
    timeZone: settings.timeZone,
    figures: {
      seconds,
      coverage,
      meetsMinimum,
      sampleSeconds,
      LAeq,
      LAFmax,
      LA10: LAN['10'] ?? null,
      LA90: LAN['90'] ?? null,
    },
    ...spectrum,
    conditions,
    limitWind,
    events,
    neighbours,
    instruments,
    wind,
  };
}

async function revisionsOf(id: number): Promise<ExceedanceRevision[]> {
  const revisions = await listRevisions(id);
  return revisions.map(({ revision, at, state, levelDb, thresholdTenths, coverage, limitVersion }) => ({
    revision,
    at: at.toISOString(),
    state,
    level: toTenths(levelDb) / 10,
    threshold: thresholdTenths / 10,
    coverage,
    limitVersion,
  }));
}

async function mailsOf(id: number, seesRecipients: boolean): Promise<ExceedanceMail[]> {
  const mails = await listExceedanceMails(id);
  return mails.map(({ createdAt, state, sentAt, attempts, recipient, lastError }) => ({
    createdAt: createdAt.toISOString(),
    state,
    sentAt: sentAt?.toISOString() ?? null,
    attempts,
    ...(seesRecipients && { recipient, lastError }),
  }));
}
