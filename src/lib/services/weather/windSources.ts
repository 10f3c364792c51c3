import { pool, type Connection } from '#db/queries/connection';
import { formatInstantUtc } from '#lib/contracts/common';
import type { WindSource } from '#lib/contracts/windSource';
import { type Span } from '../levels/spans';
import { mastsOf } from './mastsOf';
import { periodWind, type SourcedWind } from './periodWind';

/** Reading the records of a longer period would take as long as its levels do. */
const MOST_TOLD_SEC = 7 * 86_400;
const DAY_SEC = 86_400;

/** By what the wind of a station's period is known; figures only of a period that is not too long for them. */
export async function windSources(
  stationId: number,
  period: Span,
  conn: Connection = pool(),
): Promise<WindSource[]> {
  if (period.toSec - period.fromSec <= MOST_TOLD_SEC)
    return (await periodWind(stationId, period, conn)).map(told);
  const [lastDay, masts] = await Promise.all([
    periodWind(stationId, { fromSec: period.toSec - DAY_SEC, toSec: period.toSec }, conn),
    mastsOf(stationId, period),
  ]);
  // A sensor that tells of the period's last day is taken to have been there.
  const own = lastDay.filter(({ mast }) => mast === null).map(() => untold(null, period));
  return [...own, ...masts.map(({ from, to, ...mast }) => ({ ...untold(mast, period), from, to }))];
}

function told({ mast, wind, ...span }: SourcedWind): WindSource {
  if (!wind) return { ...untold(mast, span), seconds: 0 };
  return {
    ...untold(mast, span),
    seconds: wind.seconds,
    meanSpeed: wind.meanSpeedMs,
    maximumSpeed: wind.maximumSpeedMs,
    direction: wind.directionDeg,
  };
}

function untold(mast: WindSource['mast'], { fromSec, toSec }: Span): WindSource {
  return {
    source: mast ? 'mast' : 'station',
    mast,
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
    seconds: null,
    meanSpeed: null,
    maximumSpeed: null,
    direction: null,
  };
}
