import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import { periodsOf, type PeriodInstance } from '#lib/time/periods';
import { addDays, localDateAt, startOfDaySec, type LocalDate } from '#lib/time/zone';

/**
 * Settings whose scheme and zone a local date's day, evening and night follow: those in force at the midnight that begins
 * it. So a date has one scheme, and changed settings take effect with the first whole date after the change.
 */
export function settingsOfDate(date: LocalDate, timeline: NetworkSettings[]): NetworkSettings {
  const nearby = pickSettings(timeline, Date.parse(`${date}T00:00:00Z`) / 1000);
  return pickSettings(timeline, startOfDaySec(date, nearby.timeZone));
}

/** The periods that begin on a date, in order of time; the night ends where the next date's day begins by its own scheme. */
export function datePeriods(date: LocalDate, timeline: NetworkSettings[]): PeriodInstance[] {
  const { scheme, timeZone } = settingsOfDate(date, timeline);
  const periods = periodsOf(date, scheme, timeZone);
  if (timeline.length === 1) return periods;
  const next = addDays(date, 1);
  const nextSettings = settingsOfDate(next, timeline);
  const [nextDay] = periodsOf(next, nextSettings.scheme, nextSettings.timeZone);
  return periods.map((period) =>
    period.kind === 'night' && nextDay ? { ...period, toSec: nextDay.fromSec } : period,
  );
}

/** Every period that overlaps `fromSec <= t < toSec`, whole, in order of time. */
export function periodsTouching(
  fromSec: number,
  toSec: number,
  timeline: NetworkSettings[],
): PeriodInstance[] {
  const found: PeriodInstance[] = [];
  const firstZone = pickSettings(timeline, fromSec).timeZone;
  const lastDate = addDays(localDateAt(toSec, pickSettings(timeline, toSec).timeZone), 1);
  for (let date = addDays(localDateAt(fromSec, firstZone), -2); date <= lastDate; date = addDays(date, 1)) {
    found.push(
      ...datePeriods(date, timeline).filter((period) => period.fromSec < toSec && fromSec < period.toSec),
    );
  }
  return found;
}
