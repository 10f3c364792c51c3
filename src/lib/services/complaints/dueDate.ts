import { addDays, weekdayOf, type LocalDate } from '#lib/time/zone';

/** Working days within which a complaint is to be answered. Working days are Monday to Friday; public holidays count. */
export const WORKING_DAYS_TO_ANSWER = 10;

const SATURDAY = 5;

/** The date that lies a number of working days (Monday to Friday) after `date`, which itself is not counted. */
export function addWorkingDays(date: LocalDate, workingDays: number): LocalDate {
  let found = date;
  for (let left = workingDays; left > 0;) {
    found = addDays(found, 1);
    if (weekdayOf(found) < SATURDAY) left -= 1;
  }
  return found;
}
