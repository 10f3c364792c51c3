import type { CountedComplaint } from '#db/queries/complaintCounts';
import type { MeasureComparison } from '#lib/contracts/complaintNumbers';
import { addDays, localDateAt, startOfDaySec, type LocalDate } from '#lib/time/zone';
import { countedOf, isRepeat, type CountsQuery } from './counts';
import { chanceOfDifference } from './twoCounts';

/**
 * Complaints in two spans of the same number of civil dates, before a date and from it on; shorter where fewer whole dates have passed
 * since. Null where not one has. Repeats do not count.
 */
export async function compareMeasure(
  query: Omit<CountsQuery, 'fromSec' | 'toSec'>,
  measureOn: LocalDate,
  wantedDays: number,
  nowSec: number,
): Promise<MeasureComparison | null> {
  const { timeZone } = query;
  const days = Math.min(wantedDays, daysBetween(measureOn, localDateAt(nowSec, timeZone)));
  if (days < 1) return null;
  const dates = [addDays(measureOn, -days), measureOn, addDays(measureOn, days)] as const;
  const [fromSec, middleSec, toSec] = dates.map((date) => startOfDaySec(date, timeZone)) as [
    number,
    number,
    number,
  ];
  const rows = (await countedOf({ ...query, fromSec, toSec })).filter((row) => !isRepeat(row));
  const before = rows.filter(({ startsAtSec }) => startsAtSec < middleSec);
  const after = rows.filter(({ startsAtSec }) => startsAtSec >= middleSec);
  return {
    measureOn,
    days,
    isShortened: days < wantedDays,
    before: { from: dates[0], to: dates[1], ...countsOf(before, timeZone) },
    after: { from: dates[1], to: dates[2], ...countsOf(after, timeZone) },
    chance: chanceOfDifference(before.length, after.length),
  };
}

function countsOf(rows: readonly CountedComplaint[], timeZone: string) {
  return {
    total: rows.length,
    dates: new Set(rows.map(({ startsAtSec }) => localDateAt(startsAtSec, timeZone))).size,
    withExceedance: rows.filter(({ hasExceedance }) => hasExceedance).length,
  };
}

function daysBetween(from: LocalDate, to: LocalDate): number {
  return Math.round((Date.parse(to) - Date.parse(from)) / 86_400_000);
}
