import { type Drift } from '#lib/contracts/drift';
import { csvText } from '#lib/format/csvText';

/** Nights and self-checks of a station, one line a date, with what was done on it. */
export function driftCsv({ days, marks }: Drift): string {
  const header = ['date', 'LA90night', 'coverage', 'differenceDb', 'selfCheckDb', 'done'];
  const rounded = (value: number | null) => (value === null ? null : Number(value.toFixed(3)));
  const rows = days.map(({ date, LA90, coverage, difference, selfCheck }) => [
    date,
    LA90,
    rounded(coverage),
    rounded(difference),
    rounded(selfCheck),
    marks
      .filter((mark) => mark.date === date)
      .map(({ words }) => words)
      .join('; '),
  ]);
  return csvText([header, ...rows]);
}
