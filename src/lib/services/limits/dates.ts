import type { LimitVersion } from '#db/queries/limits';
import { weekdayOf, type LocalDate } from '#lib/time/zone';

const SUNDAY = 6;

/** Whether windows of a limit may begin on a civil date: by its weekdays, and by what the network's named dates are to it. */
export function isDateOf(
  { weekdays, holidays, holidayDates }: Pick<LimitVersion, 'weekdays' | 'holidays' | 'holidayDates'>,
  date: LocalDate,
): boolean {
  const isHoliday = holidays !== 'as-weekday' && holidayDates.has(date);
  if (holidays === 'only' && !isHoliday) return false;
  if (holidays === 'never' && isHoliday) return false;
  const weekday = holidays === 'as-sunday' && isHoliday ? SUNDAY : weekdayOf(date);
  // A list of dates is one: on which weekday they fall does not matter then.
  return holidays === 'only' || (weekdays & (1 << weekday)) !== 0;
}
