import { EVENT_METRICS } from '#lib/acoustics/limitQuantities';
import type { PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { formatClockTime } from '#lib/contracts/common';
import { WEEKDAYS, type Limit, type LimitVersionView, type Weekday } from '#lib/contracts/limits';
import { formatCoverage, formatLevelDb } from '#lib/format/levels';

export const STATE_WORDS: Readonly<Record<Limit['state'], string>> = {
  'in-force': 'In force',
  upcoming: 'To come',
  withdrawn: 'Withdrawn',
};

export const WEEKDAY_WORDS: Readonly<Record<Weekday, string>> = {
  mon: 'Mon',
  tue: 'Tue',
  wed: 'Wed',
  thu: 'Thu',
  fri: 'Fri',
  sat: 'Sat',
  sun: 'Sun',
};

/** "every day", "Mon–Fri", "Mon, Wed–Fri" of weekdays in their order. */
export function weekdaysWords(days: readonly Weekday[]): string {
  if (days.length === WEEKDAYS.length) return 'every day';
  const runs: Weekday[][] = [];
  for (const day of days) {
    const run = runs.at(-1);
    const last = run?.at(-1);
    if (run && last && WEEKDAYS.indexOf(day) === WEEKDAYS.indexOf(last) + 1) run.push(day);
    else runs.push([day]);
  }
  return runs.map(runWords).join(', ');
}

function runWords(run: readonly Weekday[]): string {
  const words = run.map((day) => WEEKDAY_WORDS[day]);
  return words.length > 2 ? `${words[0]}–${words.at(-1)}` : words.join(', ');
}

/** "23:00–07:00" of a period of day of a network; null where the network has no such period. */
export function hoursOf(period: 'day' | 'evening' | 'night', scheme: PeriodScheme): string | null {
  const { dayStartMin, eveningStartMin, nightStartMin } = scheme;
  const edges = {
    day: [dayStartMin, eveningStartMin ?? nightStartMin],
    evening: [eveningStartMin, nightStartMin],
    night: [nightStartMin, dayStartMin],
  } as const;
  const [from, to] = edges[period];
  return from === null ? null : `${formatClockTime(from)}–${formatClockTime(to)}`;
}

/** When a limit's windows begin: "every day, 22:00–06:00", "Mon–Fri, night (23:00–07:00)". */
export function whenWords(
  {
    weekdays,
    holidays,
    window,
    from,
    to,
  }: Pick<LimitVersionView, 'weekdays' | 'holidays' | 'window' | 'from' | 'to'>,
  scheme: PeriodScheme,
): string {
  const days = datesWords(weekdays, holidays);
  if (window === '15min' || window === '1h' || window === 'length' || window === 'hours') {
    return from === null || to === null ? `${days}, all day` : `${days}, ${from}–${to}`;
  }
  if (window === 'den')
    return `${days}, from ${formatClockTime(scheme.dayStartMin)} to the same time of the next date`;
  const hours = hoursOf(window, scheme);
  return hours === null ? `${days}, ${window}` : `${days}, ${window} (${hours})`;
}

/** "every day", "Mon–Fri, not on holidays", "holidays only". */
export function datesWords(weekdays: readonly Weekday[], holidays: LimitVersionView['holidays']): string {
  const days = weekdaysWords(weekdays);
  switch (holidays) {
    case 'as-weekday':
      return days;
    case 'as-sunday':
      return `${days} (a holiday counts as a Sunday)`;
    case 'never':
      return `${days}, not on holidays`;
    case 'only':
      return 'holidays only';
  }
}

/** "every station", their codes, or "Quay side: MER-01, MER-02" of a group. */
export function stationsWords({
  stations,
  groupName = null,
}: {
  stations: readonly string[] | null;
  groupName?: string | null;
}): string {
  if (stations === null) return groupName ?? 'every station';
  const codes = stations.join(', ');
  return groupName === null ? codes : `${groupName}: ${codes}`;
}

/** Coverage that a window needs to be compared. */
export function coverageWords(
  { metric, minimumCoverage }: Pick<LimitVersionView, 'metric' | 'minimumCoverage'>,
  networkMinimum: number,
): string {
  if (metric === 'LAFmax') return 'any: a maximum that was measured is one';
  if (EVENT_METRICS.includes(metric)) return 'any: events that were measured are some';
  if (minimumCoverage === null) return `${formatCoverage(networkMinimum)} (the network’s minimum)`;
  return formatCoverage(minimumCoverage);
}

/** What makes an event of a limit on events; nothing of others. */
export function eventFacts({
  eventThreshold,
  eventSeconds,
  eventGap,
}: Pick<LimitVersionView, 'eventThreshold' | 'eventSeconds' | 'eventGap'>): [string, string][] {
  if (eventThreshold === null || eventSeconds === null) return [];
  const gap = `gaps of up to ${eventGap ?? 0} s do not end it`;
  return [
    ['An event', `LAeq above ${formatLevelDb(eventThreshold)} dB for at least ${eventSeconds} s; ${gap}`],
  ];
}

/** Labels of the form's fields, by name. */
export const LIMIT_LABELS = {
  name: 'Name',
  metric: 'Quantity',
  band: 'Band',
  bandHz: 'Band',
  bandFraction: 'Band',
  bandTo: 'Last band',
  bandToHz: 'Last band',
  percent: 'Exceeded for',
  eventThreshold: 'An event is above',
  eventSeconds: 'for at least',
  eventGap: 'Gaps that do not end it',
  backgroundPercent: 'Background',
  backgroundFrom: 'Background from',
  backgroundTo: 'to',
  windMinimum: 'Lowest wind speed',
  windMaximum: 'Highest wind speed',
  windFrom: 'Wind from',
  windTo: 'clockwise to',
  windDismissAbove: 'Not compared above a mean wind of',
  windUnknown: 'Wind that is not known',
  window: 'Window',
  windowMinutes: 'Length of the window',
  stepMinutes: 'Rolling windows',
  threshold: 'Limit',
  weekdays: 'Days of the week',
  holidays: 'Holidays of the network',
  from: 'Windows begin from',
  to: 'and before',
  minimumCoverage: 'Minimum coverage',
  scope: 'Stations',
  stations: 'Chosen stations',
  group: 'Group of stations',
  recipients: 'Who gets e-mail',
  effectiveFrom: 'In force from',
  reason: 'Reason',
} as const;
