import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { addDays, startOfDaySec, type LocalDate } from '#lib/time/zone';
import { datePeriods, settingsOfDate } from '../levels/datePeriods';

/** A local month: half-open by the clock, and its dates. */
export interface MonthSpan {
  month: string;
  /** Zone in force when the month begins. */
  timeZone: string;
  /** Local midnights that begin and end it, epoch seconds. */
  fromSec: number;
  toSec: number;
  firstDate: LocalDate;
  /** First date of the next month. */
  endDate: LocalDate;
  /** When the day of the first date begins, and when the night of the last date ends: what is pooled by date. */
  firstDayStartSec: number;
  lastNightEndSec: number;
}

/** Where a month (`YYYY-MM`) begins and ends by the network's settings. */
export function monthSpan(month: string, timeline: NetworkSettings[]): MonthSpan {
  const firstDate = `${month}-01`;
  const endDate = `${addDays(firstDate, 31).slice(0, 7)}-01`;
  const { timeZone } = settingsOfDate(firstDate, timeline);
  const fromSec = startOfDaySec(firstDate, timeZone);
  const toSec = startOfDaySec(endDate, settingsOfDate(endDate, timeline).timeZone);
  return {
    month,
    timeZone,
    fromSec,
    toSec,
    firstDate,
    endDate,
    firstDayStartSec: datePeriods(firstDate, timeline)[0]?.fromSec ?? fromSec,
    lastNightEndSec: datePeriods(addDays(endDate, -1), timeline).at(-1)?.toSec ?? toSec,
  };
}

/** Whether a station stood at some time of a month, so that its missing data are to be told. */
export function stoodWithin(
  { createdAt, retiredAt }: Pick<StationRow, 'createdAt' | 'retiredAt'>,
  { fromSec, toSec }: MonthSpan,
): boolean {
  return createdAt.getTime() < toSec * 1000 && (retiredAt === null || retiredAt.getTime() > fromSec * 1000);
}
