import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import { periodsOf, type PeriodInstance } from '#lib/time/periods';
import { addDays, datesBetween, localDateAt, startOfDaySec, type LocalDate } from '#lib/time/zone';

/** A local date by a network's settings. */
export interface DateSettings {
  /**
   * Those whose scheme and zone the date's day, evening and night follow: in force at the midnight that begins it. So a date
   * has one scheme, and changed settings take effect with the first whole date after the change.
   */
  settings: NetworkSettings;
  /** The midnight that begins the date, epoch seconds. */
  midnightSec: number;
}

/** Civil time is slow to work out and asked for again and again; a timeline is read from the database as a new array each time. */
const datesOfTimeline = new WeakMap<NetworkSettings[], Map<LocalDate, DateSettings>>();
const periodsOfTimeline = new WeakMap<NetworkSettings[], Map<LocalDate, PeriodInstance[]>>();

/** Settings that a date follows, and its first instant. */
export function dateSettings(date: LocalDate, timeline: NetworkSettings[]): DateSettings {
  return remembered(datesOfTimeline, timeline, date, () => {
    const nearby = pickSettings(timeline, Date.parse(`${date}T00:00:00Z`) / 1000);
    const settings = pickSettings(timeline, startOfDaySec(date, nearby.timeZone));
    return { settings, midnightSec: startOfDaySec(date, settings.timeZone) };
  });
}

/** Settings that a date follows. */
export function settingsOfDate(date: LocalDate, timeline: NetworkSettings[]): NetworkSettings {
  return dateSettings(date, timeline).settings;
}

/** The periods that begin on a date, in order of time; the night ends where the next date's day begins by its own scheme. */
export function datePeriods(date: LocalDate, timeline: NetworkSettings[]): PeriodInstance[] {
  return remembered(periodsOfTimeline, timeline, date, () => {
    const { scheme, timeZone } = settingsOfDate(date, timeline);
    const periods = periodsOf(date, scheme, timeZone);
    if (timeline.length === 1) return periods;
    const next = addDays(date, 1);
    const following = settingsOfDate(next, timeline);
    const [nextDay] = periodsOf(next, following.scheme, following.timeZone);
    return periods.map((period) =>
      period.kind === 'night' && nextDay ? { ...period, toSec: nextDay.fromSec } : period,
    );
  });
}

function remembered<T>(
  memory: WeakMap<NetworkSettings[], Map<LocalDate, T>>,
  timeline: NetworkSettings[],
  date: LocalDate,
  make: () => T,
): T {
  const dates = memory.get(timeline) ?? new Map<LocalDate, T>();
  memory.set(timeline, dates);
  const known = dates.get(date);
  if (known !== undefined) return known;
  const made = make();
  dates.set(date, made);
  return made;
}

/** Every period that overlaps `fromSec <= t < toSec`, whole, in order of time. */
export function periodsTouching(
  fromSec: number,
  toSec: number,
  timeline: NetworkSettings[],
): PeriodInstance[] {
  // Where the zone changes, a date may lie up to a day elsewhere in time.
  const slackDays = timeline.length === 1 ? 0 : 1;
  const firstDate = localDateAt(fromSec, pickSettings(timeline, fromSec).timeZone);
  const lastDate = localDateAt(toSec, pickSettings(timeline, toSec).timeZone);
  const found: PeriodInstance[] = [];
  // A night reaches into the next date.
  const dates = datesBetween(addDays(firstDate, -1 - slackDays), addDays(lastDate, 1 + slackDays));
  for (const date of dates) {
    found.push(
      ...datePeriods(date, timeline).filter((period) => period.fromSec < toSec && fromSec < period.toSec),
    );
  }
  return found;
}
