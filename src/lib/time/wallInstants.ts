import { DateTime } from 'luxon';
import { LocalInstants, zoneNamed } from './localInstants';
import { instantAtSec, type LocalDate } from './zone';

/**
 * Every instant (epoch seconds) at which the wall showed a time: `minutes` after midnight of a date. Two in the hour that comes twice
 * in autumn; where the clock was put forward over it, the one just after.
 */
export function wallInstants(date: LocalDate, minutes: number, zone: string): number[] {
  const known = zoneNamed(zone);
  const wallMs = DateTime.fromISO(date, { zone: 'utc' }).toMillis() + minutes * 60_000;
  const found = known ? new LocalInstants(known).at(wallMs).map((ms) => ms / 1000) : [];
  return found.length > 0 ? found : [instantAtSec(date, minutes, zone)];
}
