import { pool, type Connection } from '#db/queries/connection';
import { listHealthSettings } from '#db/queries/healthSettings';
import { listSettings, pickSettings } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import { judgeDrift, relativeToNeighbours, type DriftVerdict } from '#lib/acoustics/drift';
import { type Drift, type DriftVerdictJson } from '#lib/contracts/drift';
import { addDays } from '#lib/time/zone';
import { distanceM } from '../complaints/whereabouts';
import { thresholdsFor } from '../health/thresholds';
import { driftDates, nightsOf, selfCheckDays, type Night } from './backgrounds';
import { driftMarks } from './marks';

/** Stations that one is compared with at most: the nearest. */
const MOST_NEIGHBOURS = 5;

/** Nights of a network's stations, read once for all of them. */
class NetworkNights {
  readonly #read = new Map<number, Promise<Night[]>>();

  constructor(private readonly reading: (stationId: number) => Promise<Night[]>) {}

  of(stationId: number): Promise<Night[]> {
    const nights = this.#read.get(stationId) ?? this.reading(stationId);
    this.#read.set(stationId, nights);
    return nights;
  }
}

/** What is needed to judge any station of a network. */
export interface DriftSource {
  stations: readonly StationRow[];
  dates: string[];
  zone: string;
  nights: NetworkNights;
  boundsOf(stationId: number): { backgroundDb: number; selfCheckDb: number };
  nowSec: number;
  conn: Connection;
}

export async function driftSource(
  networkId: number,
  nowSec: number,
  conn: Connection = pool(),
): Promise<DriftSource> {
  const [timeline, stations, settings] = await Promise.all([
    listSettings(networkId, conn),
    listStations(networkId, conn),
    listHealthSettings(networkId, conn),
  ]);
  const dates = driftDates(timeline, nowSec);
  return {
    stations: stations.filter(({ retiredAt }) => retiredAt === null),
    dates,
    zone: pickSettings(timeline, nowSec).timeZone,
    nights: new NetworkNights((stationId) => nightsOf(stationId, dates, timeline, conn)),
    boundsOf(stationId) {
      const { driftShift, selfCheckShift } = thresholdsFor(stationId, settings);
      return { backgroundDb: driftShift, selfCheckDb: selfCheckShift };
    },
    nowSec,
    conn,
  };
}

/**
 * How a station's nightly background (LA90 of the night) has moved against its nearest neighbours', and its self-checks against their
 * nominal level, with what was done to its instrument. A warning at most: nothing is corrected by it.
 */
export async function stationDrift(station: StationRow, source: DriftSource): Promise<Drift> {
  const { dates, zone, nights, nowSec, conn } = source;
  const near = neighboursOf(station, source.stations);
  const own = await nights.of(station.id);
  const others = await Promise.all(near.map(({ id }) => nights.of(id)));
  const level = ({ la90Db }: Night) => la90Db;
  const differences = relativeToNeighbours(
    own.map(level),
    others.map((series) => series.map(level)),
  );
  const [checks, marks] = await Promise.all([
    selfCheckDays(station.id, dates, zone, nowSec, conn),
    driftMarks(station, zone, conn),
  ]);
  // The day of the work itself is neither before nor after it.
  const anchor = marks.findLast(({ kind }) => kind !== 'check')?.date ?? null;
  const since = anchor === null ? null : addDays(anchor, 1);
  const fromDay = since === null ? 0 : dates.findIndex((date) => date >= since);
  const firstDay = fromDay === -1 ? dates.length : fromDay;
  const bounds = source.boundsOf(station.id);
  return {
    station: station.code,
    from: dates[0] ?? '',
    to: addDays(dates.at(-1) ?? '1970-01-01', 1),
    neighbours: near.map(({ code }) => code),
    since,
    background: verdictJson(judgeDrift(differences, bounds.backgroundDb, firstDay), bounds.backgroundDb),
    selfCheck: verdictJson(judgeDrift(checks, bounds.selfCheckDb, firstDay), bounds.selfCheckDb),
    days: dates.map((date, day) => ({
      date,
      LA90: own[day]?.la90Db ?? null,
      coverage: own[day]?.coverage ?? null,
      difference: differences[day] ?? null,
      selfCheck: checks[day] ?? null,
    })),
    marks: marks.filter(({ date }) => date >= (dates[0] ?? '')),
  };
}

function neighboursOf(station: StationRow, stations: readonly StationRow[]): StationRow[] {
  return stations
    .filter(({ id }) => id !== station.id)
    .map((other) => ({ other, metres: distanceM(station, other) }))
    .sort((a, b) => a.metres - b.metres)
    .slice(0, MOST_NEIGHBOURS)
    .map(({ other }) => other);
}

function verdictJson(verdict: DriftVerdict, bound: number): DriftVerdictJson {
  const { state, by, changeDb, baselineDb, recentDb } = verdict;
  return { state, by, change: changeDb, bound, baseline: baselineDb, recent: recentDb };
}
