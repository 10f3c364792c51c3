import { addDays, weekdayOf } from '#lib/time/zone';

/** A month as weeks of seven cells from Monday on; null where the week reaches beyond the month. */
export function weeksOf<Day extends { date: string }>(days: readonly Day[]): (Day | null)[][] {
  const [first] = days;
  if (!first) return [];
  const before = Array.from({ length: weekdayOf(first.date) }, () => null);
  const cells = [...before, ...days];
  const weeks = Array.from({ length: Math.ceil(cells.length / 7) }, (_, at) =>
    cells.slice(at * 7, at * 7 + 7),
  );
  const last = weeks.at(-1);
  while (last && last.length < 7) last.push(null);
  return weeks;
}

/** `2026-02` of `2026-03` and −1. */
export function monthStep(month: string, months: number): string {
  const [year = 0, of = 1] = month.split('-').map(Number);
  const at = year * 12 + of - 1 + months;
  return `${Math.floor(at / 12)}-${String((at % 12) + 1).padStart(2, '0')}`;
}

/** First date of a month, and of the one after. */
export function monthDates(month: string): { fromDate: string; toDate: string } {
  return { fromDate: `${month}-01`, toDate: `${monthStep(month, 1)}-01` };
}

/** The date after, for the address of a day's strip. */
export const dayAfter = (date: string) => addDays(date, 1);
