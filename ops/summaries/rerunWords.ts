import { type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { type Rerun } from '#lib/services/summaries/life/rerun';

/** What came of computing an issued month again, in lines. */
export function rerunWords(
  { month, revision }: Pick<IssuedSummaryRow, 'month' | 'revision'>,
  { damagedFiles, changedData, changedYear, withoutIntervals, notCompared, differences }: Rerun,
): { isSame: boolean; lines: string[] } {
  const changes = [damagedFiles, changedData, changedYear ?? [], differences];
  const isSame = changes.every(({ length }) => length === 0);
  return {
    isSame,
    lines: [
      `${month}, revision ${revision}: manifest and signature hold.`,
      ...damagedFiles.map((name) => `DAMAGED  ${name} is gone or is not what was sealed.`),
      ...changedData.map((code) => `CHANGED  intervals of ${code} are not those that were sealed.`),
      ...(changedYear ?? []).map(
        ({ station, month: of }) =>
          `CHANGED  sums of ${station} in ${of}, which the year to date rests on, are not those that were sealed.`,
      ),
      ...(changedYear === null && !month.endsWith('-01')
        ? ['NOTE     nothing was sealed of the months before, which the year to date rests on.']
        : []),
      ...withoutIntervals.map(
        (code) =>
          `NOTE     intervals of ${code} are not kept any more; its figures come from the sealed sums of its quarter-hours and days.`,
      ),
      ...(notCompared === 0
        ? []
        : [
            `NOTE     ${notCompared} of their figures, those that only intervals tell and those by the clock, cannot be compared any more.`,
          ]),
      ...differences.map(
        ({ station, figure, old, new: now }) =>
          `DIFFERS  ${station ?? 'network'} ${figure}: ${String(old)} was sealed, ${String(now)} now.`,
      ),
      isSame ? 'Every figure that was compared is the same.' : `${differences.length} figures differ.`,
    ],
  };
}
