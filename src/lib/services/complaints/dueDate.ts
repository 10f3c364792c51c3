import { readDeskSettings } from '#db/queries/complaintSettings';
import { pool, type Connection } from '#db/queries/connection';
import { listHolidays } from '#db/queries/holidays';
import type { DeskSettings } from '#lib/contracts/complaintDesk';
import { addDays, weekdayOf, type LocalDate } from '#lib/time/zone';

/** On which dates a network works. */
export interface WorkingCalendar {
  /** 0 Monday to 6 Sunday; at least one. */
  weekdays: ReadonlySet<number>;
  /** Named dates on which nobody works, whatever their weekday. */
  holidays: ReadonlySet<LocalDate>;
}

/** A list of named dates never takes more than this out of the calendar in one piece, days. */
const LONGEST_SEARCH_DAYS = 3 * 366;

/** The date that lies a number of working days after `date`, which itself is not counted. */
export function addWorkingDays(
  date: LocalDate,
  workingDays: number,
  { weekdays, holidays }: WorkingCalendar,
): LocalDate {
  let found = date;
  let left = workingDays;
  for (let searched = 0; left > 0 && searched < LONGEST_SEARCH_DAYS; searched += 1) {
    found = addDays(found, 1);
    if (weekdays.has(weekdayOf(found)) && !holidays.has(found)) left -= 1;
  }
  return found;
}

/** The working calendar of a network: its settings and its named dates. */
export async function workingCalendarOf(
  networkId: number,
  { workingWeekdays }: Pick<DeskSettings, 'workingWeekdays'>,
  conn: Connection = pool(),
): Promise<WorkingCalendar> {
  const holidays = await listHolidays(networkId, conn);
  return { weekdays: new Set(workingWeekdays), holidays: new Set(holidays.map(({ date }) => date)) };
}

/** When a complaint that comes in on `today` is to be answered, by the network's settings. */
export async function answerDueOn(
  networkId: number,
  today: LocalDate,
  conn: Connection = pool(),
): Promise<LocalDate> {
  const settings = await readDeskSettings(networkId, conn);
  return addWorkingDays(today, settings.answerDays, await workingCalendarOf(networkId, settings, conn));
}
