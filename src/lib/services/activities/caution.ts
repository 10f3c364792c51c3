import { LEAST_BLOCKS, type LevelSet } from '#lib/acoustics/onOff';

/** How far a comparison can be relied on, in words. */
export function cautionOf(
  on: LevelSet,
  off: LevelSet,
  { differenceDb, expandedDb }: { differenceDb: number | null; expandedDb: number | null },
): string {
  if (on.count === 0)
    return 'No whole quarter-hour with the activity has enough valid data: nothing to compare.';
  if (off.count === 0) {
    return 'At these hours of the day no quarter-hour without the activity has enough valid data: nothing to compare.';
  }
  if (differenceDb === null || expandedDb === null) {
    const few = Math.min(on.blockCount, off.blockCount);
    return `Too few to say how certain the difference is: ${few} ${few === 1 ? 'occasion' : 'occasions'} on one side, ${LEAST_BLOCKS} are needed. Take it as a hint.`;
  }
  const found =
    Math.abs(differenceDb) > expandedDb
      ? 'The difference is larger than its uncertainty.'
      : 'The difference is within its uncertainty: the data do not show one.';
  return `${found} Weather and whatever else happened at the same time may have a part in it.`;
}
