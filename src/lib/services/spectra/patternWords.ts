import { formatClockTime } from '#lib/contracts/common';
import { type Pattern } from './pattern';

const DAY_NAMES = ['Mondays', 'Tuesdays', 'Wednesdays', 'Thursdays', 'Fridays', 'Saturdays', 'Sundays'];
/** With fewer spells chance makes patterns. */
const LEAST_SPELLS = 4;
const ONE_DAY_SHARE = 0.8;
const MOST_NAMED = 3;

/** When and where most of it was: "Mostly weekdays 05:40–06:10, at Ropewalk too." Empty with too few spells to tell. */
export function patternWords(pattern: Pattern, spells: number, otherStations: readonly string[]): string {
  if (spells < LEAST_SPELLS) return '';
  const clock =
    pattern.stretch &&
    `${formatClockTime(pattern.stretch.fromMinute)}–${formatClockTime(pattern.stretch.toMinute)}`;
  const when = clock
    ? `Mostly ${[daysWord(pattern), clock].filter(Boolean).join(' ')}`
    : `At all hours${daysWord(pattern) ? `, mostly ${daysWord(pattern)}` : ''}`;
  return `${when}${elsewhere(otherStations)}.`;
}

function daysWord({ weekdays, days }: Pattern): string {
  const total = weekdays.reduce((sum, minutes) => sum + minutes, 0);
  const single = weekdays.findIndex((minutes) => minutes >= ONE_DAY_SHARE * total);
  if (single >= 0) return DAY_NAMES[single] ?? '';
  return days === 'any' ? '' : days;
}

function elsewhere(names: readonly string[]): string {
  if (names.length === 0) return '';
  if (names.length > MOST_NAMED) return `, at ${names.length} other stations too`;
  return `, at ${new Intl.ListFormat('en-GB').format(names)} too`;
}
