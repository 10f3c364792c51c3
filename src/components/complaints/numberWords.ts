import type { ComplaintNumbers, MeasureComparison } from '#lib/contracts/complaintNumbers';
import { formatMonth } from '#lib/format/times';
import { KIND_WORDS } from './words';

/** "1 complaint", "12 complaints". */
export function complaintsText(count: number): string {
  return `${count} ${count === 1 ? 'complaint' : 'complaints'}`;
}

/** "3 of 4, 75 %"; of none there is no share. */
export function shareText({ count, of }: { count: number; of: number }): string {
  return of === 0 ? 'none so far' : `${count} of ${of}, ${Math.round((count / of) * 100)}\u00a0%`;
}

/** Which month had most, in a sentence. */
export function monthSentence({ total, byMonth }: ComplaintNumbers): string {
  const most = byMonth.toSorted((a, b) => b.count - a.count)[0];
  if (total === 0 || !most) return 'No complaint in this period.';
  const silent = byMonth.filter(({ count }) => count === 0).length;
  return (
    `${complaintsText(total)} in ${byMonth.length} ${byMonth.length === 1 ? 'month' : 'months'}, most in ` +
    `${formatMonth(most.month)} (${most.count})${silent > 0 ? `; none in ${silent} of the months` : ''}.`
  );
}

/** Which sound was named most, in a sentence. */
export function kindSentence({ total, byKind }: ComplaintNumbers): string {
  const most = byKind.toSorted((a, b) => b.count - a.count)[0];
  if (total === 0 || !most) return 'No complaint in this period.';
  return `“${KIND_WORDS[most.kind]}” was named most often: ${most.count} of ${total}.`;
}

/** "03:00" */
const clock = (hour: number) => `${String(hour).padStart(2, '0')}:00`;

/** An hour of the day, "03:00 to 04:00". */
export const hourLabel = (hour: number) => `${clock(hour)} to ${clock(hour + 1)}`;

/** At which time of day noise began, in a sentence. */
export function hourSentence({ total, byHour }: ComplaintNumbers): string {
  if (total === 0) return 'No complaint in this period.';
  const early = byHour.slice(0, 6).reduce((sum, count) => sum + count, 0);
  const most = Math.max(...byHour);
  const hours = byHour.flatMap((count, hour) => (count === most ? [hour] : []));
  const [hour = 0] = hours;
  const told =
    hours.length > 1
      ? 'No hour stands out'
      : `Most began between ${clock(hour)} and ${clock(hour + 1)} (${most})`;
  return `${told}; ${early} of ${total} began between 00:00 and 06:00.`;
}

/** What the comparison may and may not be taken for, in sentences. */
export function measureCaution({ before, after, chance, days, isShortened }: MeasureComparison): string[] {
  const least = 0.05;
  const isTold = before.total + after.total > 0;
  const percent = Math.round(chance * 100);
  const difference = !isTold
    ? 'There was no complaint in either span, so nothing can be said.'
    : chance < least
      ? `A difference of this size would come about by chance alone in ${percent < 1 ? 'fewer than 1' : `about ${percent}`} of 100 such comparisons, were complaints independent.`
      : `A difference of this size comes about by chance alone in about ${percent} of 100 such comparisons: it does not show that the measure changed anything.`;
  return [
    difference,
    'Complaints are not independent: one night can bring several, and one person may write often, so the dates on which there were any are counted too. Season, weather, wind and whether people know of the form change the numbers as well. Levels and exceedances of both spans say more about the noise itself.',
    ...(isShortened ? [`Only ${days} whole days have passed since; both spans are that long.`] : []),
  ];
}
