import type { MonthDocument } from '#lib/contracts/monthDocument';
import type { Convention } from '#lib/contracts/summaries';
import { formatCoverage } from '#lib/format/levels';
import { clockChangeWords } from '#lib/format/periods';
import { formatClock, formatDate } from '#lib/format/times';
import { zoneAbbreviationAt } from '#lib/time/clockChange';
import { BELOW_MINIMUM } from './document/format';

/** An instant in a zone, with the zone's abbreviation: `Tue 17 March 2026, 03:40 GMT`. */
export function instantText(instant: string, zone: string): string {
  const sec = Date.parse(instant) / 1000;
  const minute = sec - (sec % 60);
  return `${formatDate(minute, zone)}, ${formatClock(minute, zone).slice(0, 5)} ${zoneAbbreviationAt(minute, zone)}`;
}

/** How a month's figures are made: every convention by which another reader could get others. */
export function methodStatement(summary: MonthDocument): string[] {
  return [
    ...summary.conventions.flatMap((convention) => conventionSentences(convention, summary)),
    'A night belongs to the date on which it begins. Lday, Levening, Lnight and Lden of the month pool the periods that begin in ' +
      'it, so Lnight includes the first hours of the next month and not those of its own first morning. LAeq, LAFmax, the statistical ' +
      'levels and the bands pool the calendar month by the clock.',
    ...clockChangeSentences(summary),
    'Levels of a period are energy means over the valid time alone: the energies of all its valid intervals are pooled first, ' +
      'and Lden is calculated once from the pooled levels, with the nominal hours of day, evening and night even where a clock ' +
      'change made a night longer or shorter. A date that lacks a whole period has no Lden.',
    'Statistical levels (LA10, LA50, LA90 and those of the bands) are taken from the base samples, the LAeq of each interval, rounded ' +
      'half up to 0.1 dB. They are given from 30 samples on (LA10, LA90), and not at all where interval lengths are mixed.',
    `Coverage is the valid time divided by the time that has elapsed. ${BELOW_MINIMUM} marks a figure whose coverage is below the ` +
      'minimum: it is given for information and is not compared with a limit. Missing data are not silence.',
    ...(summary.conventions.length > 1
      ? [
          'Where the periods of day changed within the month there is no Lden of the month, because its weights would be mixed.',
        ]
      : []),
    'Exceedances are listed by the calendar month in which their window begins. One that later data or an exclusion took below its ' +
      'limit is listed as lifted. Levels are rounded once, half up, to 0.1 dB; the CSV and JSON files carry them unrounded.',
  ];
}

function clockChangeSentences({ from, to, timeZone }: MonthDocument): string[] {
  const change = clockChangeWords(
    { fromSec: Date.parse(from) / 1000, toSec: Date.parse(to) / 1000 },
    timeZone,
  );
  return change === null
    ? []
    : [`${change}, and so has the night in which it falls more or less than its nominal hours.`];
}

function conventionSentences(convention: Convention, { timeZone }: MonthDocument): string[] {
  const { from, day, evening, night, minimumCoverage, maximumWindSpeed, excludeRain } = convention;
  const since = from === null ? '' : `From ${instantText(from, timeZone)} on: `;
  const periods =
    evening === null ? `day ${day}–${night}` : `day ${day}–${evening}, evening ${evening}–${night}`;
  return [
    `${since}Times are civil times of the zone ${convention.timeZone}; ${periods}, night ${night}–${day}. ` +
      `The minimum coverage is ${formatCoverage(minimumCoverage)}.`,
    `${since}Intervals are left out when the monitor flags calibration, self-check, overload, tampering, power loss, a set clock ` +
      `or wind, when the wind is above ${maximumWindSpeed} m/s` +
      `${excludeRain ? ', when it flags rain' : ''}, and where an operator excluded the period with a reason. They stay on record.`,
  ];
}

/** What the figures are not. */
export const CAUTIONS = [
  'Levels describe the places of the stations as installed, not the exposure of a person or the level at a dwelling.',
  'This summary supports a professional judgement and does not replace one: local rules, permits and the competent authority decide.',
] as const;

/** How many complaints the month had; nothing else about them is told. */
export function complaintsSentence({ complaints: { open, answered, closed } }: MonthDocument): string {
  const total = open + answered + closed;
  if (total === 0) return 'No complaint about noise in this month is on record.';
  return `Complaints about noise that began in this month: ${total}, of which ${answered} answered, ${open} open, ${closed} closed without a reply.`;
}
