import { formatInstantUtc } from '#lib/contracts/instants';
import type { NetworkLevels } from '#lib/contracts/networkMap';
import type { Station } from '#lib/contracts/stations';
import { secondsOf } from '../../stations/stateWords';

/** The quarter-hour that a station is shown as of: half-open, epoch seconds. */
export interface PastQuarter {
  fromSec: number;
  toSec: number;
  /** 0–1. */
  coverage: number;
  meetsMinimum: boolean;
  /** False while its level is being fetched. */
  isKnown: boolean;
}

/** A station as the map and the list show it: now, or as of a past quarter-hour, whose LAeq its `latest` then is. */
export interface ShownStation extends Station {
  past?: PastQuarter;
  /** Exceedances of the period, where these are shown. */
  exceedances?: number;
}

/**
 * Stations as of the quarter-hour that begins at `fromSec`; without levels, while these are being fetched, nothing is told. Those that
 * had been retired by then are left out, unless they measured all the same.
 */
export function stationsAsOf(
  stations: readonly Station[],
  levels: NetworkLevels | undefined,
  fromSec: number,
): ShownStation[] {
  const byCode = new Map(levels?.stations.map((one) => [one.station, one]));
  const stepSec = levels?.stepSeconds ?? 900;
  const toSec = fromSec + stepSec;
  const at = levels ? (fromSec - secondsOf(levels.from)) / stepSec : 0;
  return stations.flatMap((station) => {
    const held = byCode.get(station.code);
    const level = held?.LAeq[at] ?? null;
    if (level === null && isRetiredBy(station, fromSec)) return [];
    const coverage = (held?.validSeconds[at] ?? 0) / stepSec;
    const overLimit =
      held?.exceeded.some(({ from, to }) => secondsOf(from) < toSec && secondsOf(to) > fromSec) ?? false;
    const shown: ShownStation = {
      ...station,
      state: level === null ? 'silent' : 'live',
      overLimit,
      latest: level === null ? null : latestOf(fromSec, stepSec, level),
      past: {
        fromSec,
        toSec,
        coverage,
        meetsMinimum: coverage >= (levels?.minimumCoverage ?? 0),
        isKnown: levels !== undefined,
      },
    };
    return [shown];
  });
}

/** Stations that are in use now. */
export function stationsInUse(stations: readonly Station[]): Station[] {
  return stations.filter(({ state }) => state !== 'retired');
}

function isRetiredBy({ retiredAt }: Station, sec: number): boolean {
  return retiredAt !== null && secondsOf(retiredAt) <= sec;
}

function latestOf(fromSec: number, seconds: number, LAeq: number): NonNullable<Station['latest']> {
  const start = formatInstantUtc(fromSec);
  return {
    start,
    seconds,
    LAeq,
    LAFmax: null,
    flags: [],
    windSpeed: null,
    battery: null,
    receivedAt: start,
  };
}

/** Stations with how many exceedances the period has of each. */
export function withExceedances(
  stations: readonly ShownStation[],
  counts: readonly { station: string; count: number }[],
): ShownStation[] {
  const byCode = new Map(counts.map(({ station, count }) => [station, count]));
  return stations.map((station) => ({ ...station, exceedances: byCode.get(station.code) ?? 0 }));
}
