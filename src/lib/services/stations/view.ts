import { type LatestInterval } from '#db/queries/stationLatest';
import { type StationRow } from '#db/queries/stations';
import { bandAt } from '#lib/acoustics/bands';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Latest, type Station } from '#lib/contracts/stations';
import { stationState } from './state';

/** A station as the interface answers it. */
export function stationView(
  station: StationRow,
  latest: LatestInterval | undefined,
  nowSec: number,
  isOverLimit: boolean,
): Station {
  const { bandFraction } = station;
  return {
    code: station.code,
    name: station.name,
    latitude: station.latitude,
    longitude: station.longitude,
    bandFraction,
    intervalSeconds: station.intervalSec,
    firstBandHz: bandAt(bandFraction, station.firstBandIndex).nominalHz,
    lastBandHz: bandAt(bandFraction, station.lastBandIndex).nominalHz,
    placement: station.placement,
    facadeCorrection: station.facadeCorrectionDb,
    mastHeight: station.mastHeightM,
    surroundings: station.surroundings,
    acceptsFrom: station.acceptsFromSec === null ? null : formatInstantUtc(station.acceptsFromSec),
    expectedFlags: flagNames(station.expectedFlags),
    createdAt: station.createdAt.toISOString(),
    retiredAt: station.retiredAt?.toISOString() ?? null,
    state: stationState(station, latest, nowSec),
    overLimit: isOverLimit,
    latest: latest ? latestView(latest) : null,
  };
}

/** A station’s newest interval as the interface answers it. */
export function latestView(latest: LatestInterval): Latest {
  return {
    start: formatInstantUtc(latest.startSec),
    seconds: latest.durationSec,
    LAeq: centiDbToDb(latest.laeqCentiDb),
    LAFmax: latest.lafmaxCentiDb === null ? null : centiDbToDb(latest.lafmaxCentiDb),
    flags: flagNames(latest.flags),
    windSpeed: latest.windSpeedMs,
    battery: latest.batteryV,
    receivedAt: latest.receivedAt.toISOString(),
  };
}
