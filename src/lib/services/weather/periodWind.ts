import { pool, type Connection } from '#db/queries/connection';
import { findStation } from '#db/queries/stations';
import { selectStationWind } from '#db/queries/stationWind';
import { meanWind, type MeanWind } from '#lib/acoustics/mastWeather';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage } from '#lib/format/levels';
import { formatDirection, formatSpeed } from '#lib/format/wind';
import { type Span } from '../levels/spans';
import { weatherAtStation } from './stationWeather';

/** Wind of a part of a period by one source. */
export interface SourcedWind extends Span {
  /** Null: the station's own sensor. */
  mast: { code: string; name: string } | null;
  /** Null: nothing was recorded. */
  wind: MeanWind | null;
}

/** Wind of a station's period by its own sensor, where it has one, and by the masts that were assigned to it, each for its time. */
export async function periodWind(
  stationId: number,
  period: Span,
  conn: Connection = pool(),
): Promise<SourcedWind[]> {
  const own = await selectStationWind(stationId, period, conn);
  const weather = await weatherAtStation(stationId, period, conn);
  const asRecords = own.map((one) => ({ ...one, rainMm: null }));
  const ofMasts = (weather?.masts ?? []).map(({ assignment, records }) => {
    const span = {
      fromSec: Math.max(period.fromSec, assignment.fromSec),
      toSec: Math.min(period.toSec, assignment.toSec ?? Infinity),
    };
    const mast = { code: assignment.mastCode, name: assignment.mastName };
    return { ...span, mast, wind: meanWind(records, span) };
  });
  const wind = meanWind(asRecords, period);
  return [...(wind ? [{ ...period, mast: null, wind }] : []), ...ofMasts];
}

/** One source's wind in words: speed, direction, source, and how much of the time it tells of. */
export function windWords({ mast, wind, fromSec, toSec }: SourcedWind): string {
  const source = mast ? `mast ${mast.code} (${mast.name})` : 'the station’s own sensor';
  if (!wind) return `nothing recorded by ${source}`;
  return (
    `mean ${formatSpeed(wind.meanSpeedMs)} ${formatDirection(wind.directionDeg)}, highest ${formatSpeed(wind.maximumSpeedMs)}, by ${source}, ` +
    `${formatDuration(Math.round(wind.seconds))} of ${formatDuration(Math.round(toSec - fromSec))}`
  );
}

/** Wind of a period in one line. */
export function periodWindWords(sources: readonly SourcedWind[]): string {
  return sources.length === 0 ? 'not measured: no sensor, no mast' : sources.map(windWords).join('; ');
}

/** A mast's own wind of a period in one sentence. */
export function periodWindLine(wind: MeanWind | null, { fromSec, toSec }: Span): string {
  if (!wind) return 'The mast recorded nothing in this period.';
  return (
    `Mean ${formatSpeed(wind.meanSpeedMs)} ${formatDirection(wind.directionDeg)}, highest record ${formatSpeed(wind.maximumSpeedMs)}; ` +
    `${formatCoverage(wind.seconds / (toSec - fromSec))} of the period recorded.`
  );
}

/** Wind of a station's period in one line; null when the network has no such station. */
export async function stationWindWords(
  networkId: number,
  stationCode: string,
  period: Span,
): Promise<string | null> {
  const station = await findStation(networkId, stationCode);
  return station ? periodWindWords(await periodWind(station.id, period)) : null;
}
