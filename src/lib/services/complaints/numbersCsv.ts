import type { ComplaintNumbers, MeasureComparison } from '#lib/contracts/complaintNumbers';
import { csvText, type Cell } from '#lib/format/csvText';

/** Numbers as CSV, a count a line: group, value, count, and of how many where it is a share. */
export function numbersCsv(numbers: ComplaintNumbers, measure: MeasureComparison | null): string {
  const { answers, withExceedance } = numbers;
  const rows: Cell[][] = [
    ['group', 'value', 'count', 'of'],
    ['period', `${numbers.from}/${numbers.to}`, numbers.total, null],
    ['repeats', null, numbers.repeats, null],
    ...numbers.byMonth.map(({ month, count }) => ['month', month, count, null]),
    ...numbers.byKind.map(({ kind, count }) => ['kind', kind, count, null]),
    ...numbers.byArea.map(({ area, count }) => ['area', area, count, null]),
    ...numbers.byStation.map(({ station, count }) => ['nearestStation', station, count, null]),
    ...numbers.bySource.map(({ source, count }) => ['source', source, count, null]),
    ...numbers.byHour.map((count, hour) => ['hour', String(hour), count, null]),
    ['answered', null, answers.answered, null],
    ['answerTimeMedianDays', null, answers.medianDays, null],
    ['answeredWithinDue', null, answers.withinDue.count, answers.withinDue.of],
    ['withExceedance', null, withExceedance.count, withExceedance.of],
    ...(measure
      ? (['before', 'after'] as const).flatMap((side) => [
          [`${side}Measure`, `${measure[side].from}/${measure[side].to}`, measure[side].total, null],
          [`${side}MeasureDates`, null, measure[side].dates, measure.days],
          [`${side}MeasureWithExceedance`, null, measure[side].withExceedance, measure[side].total],
        ])
      : []),
  ];
  return csvText(rows);
}
