import { type ExclusionPreview } from '#lib/contracts/exclusions';
import { formatDuration } from '#lib/format/durations';

export const EXCLUSION_LABELS = {
  scope: 'Where',
  stations: 'Stations',
  from: 'From',
  to: 'To',
  kind: 'Reason',
  detail: 'In own words',
} as const;

/** What an exclusion would do, in a sentence or two. */
export function previewWords({ stations }: ExclusionPreview): string {
  const dates = stations.flatMap((station) => station.dates);
  const lostSec = dates.reduce((sum, { before, after }) => sum + before.validSeconds - after.validSeconds, 0);
  const where = stations.length === 1 ? 'one station' : `${stations.length} stations`;
  if (lostSec <= 0) return `At ${where} nothing that counts now would be excluded.`;
  const falling = dates.filter(({ before, after }) => before.meetsMinimum && !after.meetsMinimum).length;
  const leaves = `Excludes ${formatDuration(lostSec)} of valid data at ${where}.`;
  if (falling === 0) return `${leaves} No date falls below the minimum coverage by it.`;
  const which = falling === 1 ? 'One date falls' : `${falling} dates, counted for each station, fall`;
  return `${leaves} ${which} below the minimum coverage by it.`;
}

/** What was left out, after it was stored. */
export function excludedWords(count: number): string {
  const where = count === 1 ? 'one station' : `${count} stations`;
  return `Excluded at ${where}. Figures follow within a minute or two; whoever thinks better of it withdraws it here.`;
}
