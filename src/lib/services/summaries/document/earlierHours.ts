import { type Connection } from '#db/queries/connection';
import { EnergySeries } from '../../levels/energySeries';
import { type LevelSource } from '../../levels/intervalSums';
import { type Span } from '../../levels/spans';
import { type HourEnergy } from './uncertainties';

const HOUR_SEC = 3600;

/** Hours of a station from an instant on that have some valid time, ascending and current: energies alone, so that most of a year is read in a moment. */
export async function earlierHours(
  source: LevelSource,
  { fromSec, toSec }: Span,
  conn: Connection,
): Promise<HourEnergy[]> {
  if (fromSec >= toSec) return [];
  const series = await EnergySeries.read(source, { fromSec, toSec }, conn);
  const hours: HourEnergy[] = [];
  for (let hourSec = fromSec; hourSec < toSec; hourSec += HOUR_SEC) {
    const sums = await series.sums({ fromSec: hourSec, toSec: Math.min(hourSec + HOUR_SEC, toSec) });
    if (sums.validSec > 0) hours.push({ fromSec: hourSec, levels: { sums } });
  }
  return hours;
}
