import { type LevelClassCounts } from '#lib/acoustics/classCounts';
import { type Distribution } from '#lib/contracts/figureSheet';
import { EXCEEDANCE_PERCENTS } from '#lib/contracts/levels';

/** Distribution of the base samples' LAeq over the valid time; null when there is none. */
export function distributionOf(counts: LevelClassCounts, sampleSec: number | null): Distribution | null {
  const { totalSec } = counts;
  if (totalSec === 0) return null;
  const secOfClass = new Map<number, number>();
  const cumulative: Distribution['cumulative'] = [];
  let aboveSec = totalSec;
  for (const [tenths, sec] of counts.entries()) {
    const fromDb = Math.floor(tenths / 10);
    secOfClass.set(fromDb, (secOfClass.get(fromDb) ?? 0) + sec);
    aboveSec -= sec;
    cumulative.push({ levelDb: tenths / 10, exceededShare: aboveSec / totalSec });
  }
  const [lowest, highest] = [Math.min(...secOfClass.keys()), Math.max(...secOfClass.keys())];
  const classes = Array.from({ length: highest - lowest + 1 }, (_, at) => ({
    fromDb: lowest + at,
    share: (secOfClass.get(lowest + at) ?? 0) / totalSec,
  }));
  const marks = EXCEEDANCE_PERCENTS.flatMap((percent) => {
    const levelDb = counts.exceedanceLevelDb(percent, sampleSec);
    return levelDb === null ? [] : [{ percent, levelDb }];
  });
  return { classes, cumulative, marks };
}
