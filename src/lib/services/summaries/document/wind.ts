import { sumStationWind } from '#db/queries/stationWind';
import { meanWind, type MeanWind } from '#lib/acoustics/mastWeather';
import { windOfSums } from '#lib/acoustics/windOfSums';
import { formatInstantUtc } from '#lib/contracts/common';
import { type WindSource } from '#lib/contracts/monthEvidence';
import { type Span } from '../../levels/spans';
import { weatherAtStation } from '../../weather/stationWeather';
import { type StationMonth } from './evidence';

/** Wind of a month by the station’s own sensor, where it has one, and by the masts that it went by. */
export async function monthWind({ station, span, conn }: StationMonth): Promise<WindSource[]> {
  const period = { fromSec: span.fromSec, toSec: span.toSec };
  const sums = await sumStationWind(station.id, period, conn);
  const weather = await weatherAtStation(station.id, period, conn);
  const ofMasts = (weather?.masts ?? []).map(({ assignment, records }) => {
    const part = {
      fromSec: Math.max(period.fromSec, assignment.fromSec),
      toSec: Math.min(period.toSec, assignment.toSec ?? Infinity),
    };
    return sourceOf(part, { code: assignment.mastCode, name: assignment.mastName }, meanWind(records, part));
  });
  return [...(sums ? [sourceOf(period, null, windOfSums(sums))] : []), ...ofMasts];
}

function sourceOf({ fromSec, toSec }: Span, mast: WindSource['mast'], wind: MeanWind | null): WindSource {
  return {
    mast,
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
    meanSpeed: wind?.meanSpeedMs ?? null,
    maximumSpeed: wind?.maximumSpeedMs ?? null,
    direction: wind?.directionDeg ?? null,
    seconds: wind?.seconds ?? 0,
  };
}
