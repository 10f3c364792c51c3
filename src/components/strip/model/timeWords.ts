import { formatClock } from '#lib/format/times';
import { addDays, localDateAt, startOfDaySec } from '#lib/time/zone';
import { type Run } from './runs';

const formatters = new Map<string, Intl.DateTimeFormat>();

/** "Tue 17 Mar" in the zone. */
export function dayWords(sec: number, zone: string): string {
  const made =
    formatters.get(zone) ??
    new Intl.DateTimeFormat('en-GB', { weekday: 'short', day: 'numeric', month: 'short', timeZone: zone });
  formatters.set(zone, made);
  return made.format(new Date(sec * 1000)).replace(',', '');
}

/** "2026" in the zone. */
export function yearOf(sec: number, zone: string): string {
  return localDateAt(sec, zone).slice(0, 4);
}

/** "20:58" by the clock of the zone, to the second. */
export function clockWords(sec: number, zone: string): string {
  return formatClock(Math.round(sec), zone);
}

/** "Tue 17 Mar 20:58–22:04"; both dates where they differ; a stretch that ends at midnight ends at 24:00. */
export function stretchWords({ fromSec, toSec }: Run, zone: string): string {
  const from = `${dayWords(fromSec, zone)} ${clockWords(fromSec, zone)}`;
  const lastDate = localDateAt(toSec - 1, zone);
  const isToMidnight = Math.round(toSec) === startOfDaySec(addDays(lastDate, 1), zone);
  const end = isToMidnight ? '24:00' : clockWords(toSec, zone);
  if (localDateAt(fromSec, zone) === lastDate) return `${from}–${end}`;
  return `${from} – ${dayWords(toSec - 1, zone)} ${end}`;
}

const LONG_SEC = 36 * 3600;

/** "22:40–07:10": the clock times of a stretch without its dates; the dates alone, "Thu 1 Jan – Wed 16 Sep", of a long one. */
export function clockStretchWords({ fromSec, toSec }: Run, zone: string): string {
  if (toSec - fromSec > LONG_SEC) return `${dayWords(fromSec, zone)} – ${dayWords(toSec - 1, zone)}`;
  return `${clockWords(fromSec, zone)}–${clockWords(toSec, zone)}`;
}
