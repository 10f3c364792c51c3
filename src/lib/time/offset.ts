const formatters = new Map<string, Intl.DateTimeFormat>();
const remembered = new Map<string, Map<number, number>>();
const MOST_REMEMBERED = 20_000;

/** Seconds that the clock of a zone is ahead of UTC at an instant. @throws RangeError for a zone that is not known. */
export function offsetSec(epochSec: number, zone: string): number {
  // A page asks for the same midnights again and again, and formatting is slow.
  const ofZone = remembered.get(zone) ?? new Map<number, number>();
  remembered.set(zone, ofZone);
  const wholeSec = Math.floor(epochSec);
  const known = ofZone.get(wholeSec);
  if (known !== undefined) return known;
  const offset = shownSec(wholeSec, zone) - wholeSec;
  if (ofZone.size >= MOST_REMEMBERED) ofZone.clear();
  ofZone.set(wholeSec, offset);
  return offset;
}

/** What the clock on the wall shows, as the epoch seconds at which UTC shows it. */
function shownSec(epochSec: number, zone: string): number {
  const formatter = formatters.get(zone) ?? makeFormatter(zone);
  formatters.set(zone, formatter);
  const shown: Partial<Record<Intl.DateTimeFormatPartTypes, number>> = {};
  for (const { type, value } of formatter.formatToParts(epochSec * 1000)) shown[type] = Number(value);
  const { year = NaN, month = NaN, day, hour, minute, second } = shown;
  return Date.UTC(year, month - 1, day, hour, minute, second) / 1000;
}

function makeFormatter(zone: string): Intl.DateTimeFormat {
  return new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  });
}
