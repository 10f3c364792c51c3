import { type DueCheck } from '#lib/contracts/calibrations';
import { addDays } from '#lib/time/zone';

const MOST_LINE_BYTES = 75;

export interface CalendarSettings {
  networkName: string;
  /** Address of an instrument's page, without its number. */
  instrumentsUrl: string;
  /** Makes events the same ones at every reading. */
  host: string;
  now: Date;
}

/** Due dates as an iCalendar (RFC 5545): one all-day event an instrument, which moves on when the instrument is checked. */
export function dueCalendar(due: readonly DueCheck[], settings: CalendarSettings): string {
  const { networkName, instrumentsUrl, host, now } = settings;
  const stamp = `${now.toISOString().slice(0, 19).replace(/[-:]/g, '')}Z`;
  const events = due.flatMap(({ instrument, serialNumber, station, dueOn, lastCheckedAt }) => [
    'BEGIN:VEVENT',
    `UID:calibration-${instrument}@${host}`,
    `DTSTAMP:${stamp}`,
    `DTSTART;VALUE=DATE:${dayOf(dueOn)}`,
    `DTEND;VALUE=DATE:${dayOf(addDays(dueOn, 1))}`,
    `SUMMARY:${escaped(`Calibration check of ${serialNumber}${station ? `, station ${station}` : ''}`)}`,
    `DESCRIPTION:${escaped(lastCheckedAt ? `Last checked ${lastCheckedAt.slice(0, 10)}.` : 'Not checked yet.')}`,
    `URL:${instrumentsUrl}/${instrument}`,
    'TRANSP:TRANSPARENT',
    'END:VEVENT',
  ]);
  const lines = [
    'BEGIN:VCALENDAR',
    'VERSION:2.0',
    'PRODID:-//Bittern//Calibration checks//EN',
    'CALSCALE:GREGORIAN',
    'METHOD:PUBLISH',
    `X-WR-CALNAME:${escaped(`${networkName}: calibration checks`)}`,
    ...events,
    'END:VCALENDAR',
  ];
  return lines.map((line) => `${folded(line)}\r\n`).join('');
}

const dayOf = (date: string) => date.replaceAll('-', '');

function escaped(text: string): string {
  return text.replace(/[\\;,]/g, '\\$&').replace(/\r?\n/g, '\\n');
}

/** A line as lines of at most 75 octets, each further one begun with a space. */
function folded(line: string): string {
  let text = '';
  let bytes = 0;
  for (const character of line) {
    const size = Buffer.byteLength(character);
    if (bytes + size > MOST_LINE_BYTES) {
      text += '\r\n ';
      bytes = 1;
    }
    text += character;
    bytes += size;
  }
  return text;
}
