import { type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { addDays, weekdayOf, type LocalDate } from '#lib/time/zone';

const WEEKDAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'] as const;

/** "Tue"; of a night, which belongs to the date on which it begins, "Tue–Wed". */
export function weekdayWords(date: LocalDate, kind: PeriodKind): string {
  const day = WEEKDAYS[weekdayOf(date)] ?? '';
  return kind === 'night' ? `${day}–${WEEKDAYS[weekdayOf(addDays(date, 1))] ?? ''}` : day;
}
