import { CNEL_SCHEME, cnelDb, type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { l10of18hDb } from '#lib/acoustics/l10of18h';
import { type DateRow } from '#lib/contracts/figureSheet';
import { addDays, instantAtSec, localDateAt } from '#lib/time/zone';
import { dateSettings, settingsOfDate } from '../levels/datePeriods';
import { dayFigures } from '../levels/days';
import { type SheetSource } from './source';

const FIRST_HOUR_OF_18 = 6;

/** Dates that the period touches, as the first one and the one after the last. */
export function datesTouched({ period, timeZone }: Pick<SheetSource, 'period' | 'timeZone'>): {
  fromDate: string;
  toDate: string;
} {
  return {
    fromDate: localDateAt(period.fromSec, timeZone),
    toDate: addDays(localDateAt(period.toSec - 1, timeZone), 1),
  };
}

/** Figures of each date that the period touches and that has begun, each date whole. */
export async function dateRows(source: SheetSource): Promise<DateRow[]> {
  const { station, timeline, nowSec, conn } = source;
  const dates = datesTouched(source);
  const days = await dayFigures({ station, ...dates, timeline, nowSec }, conn);
  const rows: DateRow[] = [];
  for (const day of days) {
    if (dateSettings(day.date, timeline).midnightSec >= nowSec) continue;
    const isCnel = isSameScheme(settingsOfDate(day.date, timeline).scheme, CNEL_SCHEME);
    rows.push({
      ...day,
      L10of18h: await l10of18hOfDate(source, day.date),
      CNEL: isCnel ? await cnelOfDate(source, day.date) : null,
    });
  }
  return rows;
}

/** Whether the network's periods are those of CNEL on some date of the period. */
export function usesCnel({ timeline }: Pick<SheetSource, 'timeline'>, dates: readonly DateRow[]): boolean {
  return dates.some(({ date }) => isSameScheme(settingsOfDate(date, timeline).scheme, CNEL_SCHEME));
}

async function l10of18hOfDate(source: SheetSource, date: string): Promise<number | null> {
  const hourly: (number | null)[] = [];
  for (let hour = FIRST_HOUR_OF_18; hour < 24; hour += 1) {
    const levels = await source.series.levels(hourSpan(source, date, hour, hour + 1));
    hourly.push(levels.exceedanceLevelDb(10));
  }
  return l10of18hDb(hourly);
}

/** By definition over one calendar day: its night is the two part nights of the date. */
async function cnelOfDate(source: SheetSource, date: string): Promise<number | null> {
  const day = await source.series.levels(hourSpan(source, date, 7, 19));
  const evening = await source.series.levels(hourSpan(source, date, 19, 22));
  const night = await source.series.levels(hourSpan(source, date, 0, 7));
  night.merge(await source.series.levels(hourSpan(source, date, 22, 24)));
  return cnelDb({ day: day.laeqDb(), evening: evening.laeqDb(), night: night.laeqDb() });
}

function hourSpan({ timeZone }: SheetSource, date: string, fromHour: number, toHour: number) {
  return {
    fromSec: instantAtSec(date, fromHour * 60, timeZone),
    toSec: instantAtSec(date, toHour * 60, timeZone),
  };
}

function isSameScheme(a: PeriodScheme, b: PeriodScheme): boolean {
  return (
    a.dayStartMin === b.dayStartMin &&
    a.eveningStartMin === b.eveningStartMin &&
    a.nightStartMin === b.nightStartMin
  );
}
