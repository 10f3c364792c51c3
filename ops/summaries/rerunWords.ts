import { type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { type Rerun } from '#lib/services/summaries/life/rerun';

/** What came of computing an issued month again, in lines. */
export function rerunWords(
  { month, revision }: Pick<IssuedSummaryRow, 'month' | 'revision'>,
  { damagedFiles, changedData, withoutIntervals, notCompared, differences }: Rerun,
): { isSame: boolean; lines: string[] } {
  const isSame = damagedFiles.length + changedData.length + differences.length === 0;
  return {
    isSame,
    lines: [
      `${month}, revision ${revision}: manifest and signature hold.`,
      ...damagedFiles.map((name) => `DAMAGED  ${name} is gone or is not what was sealed.`),
      ...changedData.map((code) => `CHANGED  intervals of ${code} are not those that were sealed.`),
      ...withoutIntervals.map(
        (code) =>
          `NOTE     intervals of ${code} are not kept any more; its figures come from the stored sums.`,
      ),
      ...(notCompared === 0
        ? []
        : [`NOTE     ${notCompared} of their figures that only intervals tell could not be compared.`]),
      ...differences.map(
        ({ station, figure, old, new: now }) =>
          `DIFFERS  ${station ?? 'network'} ${figure}: ${String(old)} was sealed, ${String(now)} now.`,
      ),
      isSame ? 'Every figure that was compared is the same.' : `${differences.length} figures differ.`,
    ],
  };
}
