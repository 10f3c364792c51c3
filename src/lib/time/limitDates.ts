import { weekdayOf, type LocalDate } from './zone';

const SUNDAY = 6;

/** On which civil dates windows of a limit may begin. */
export interface DateRule {
  /** Bit 0 Monday … bit 6 Sunday. */
  weekdays: number;
  /** What the named dates are to the limit. */
  holidays: 'as-weekday' | 'as-sunday' | 'never' | 'only';
  holidayDates: ReadonlySet<LocalDate>;
}

/** Whether windows of a limit may begin on a civil date: by its weekdays, and by what the network's named dates are to it. */
export function isDateOf({ weekdays, holidays, holidayDates }: DateRule, date: LocalDate): boolean {
  const isHoliday = holidays !== 'as-weekday' && holidayDates.has(date);
  if (holidays === 'only' && !isHoliday) return false;
  if (holidays === 'never' && isHoliday) return false;
  const weekday = holidays === 'as-sunday' && isHoliday ? SUNDAY : weekdayOf(date);
  // A list of dates is one: on which weekday they fall does not matter then.
  return holidays === 'only' || (weekdays & (1 << weekday)) !== 0;
}
