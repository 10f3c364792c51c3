import { bandSlot, bandsOf } from '#lib/acoustics/bands';
import type { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { standingOut, type StandingOutRange } from '#lib/acoustics/standingOut';

/** What stands out of the mean spectrum of a window, most telling first; nothing where it has no bands of one width. */
export function standingOutOf(levels: PeriodAccumulator): StandingOutRange[] {
  const { bandFraction, bandValidSec, validSec } = levels.sums;
  if (bandFraction === null) return [];
  const bands = bandsOf(bandFraction).filter(({ index }) => (bandValidSec[bandSlot(index)] ?? 0) > 0);
  const levelsDb = bands.map(({ index }) => levels.bandLeqDb(index));
  return standingOut({ fraction: bandFraction, bands, levelsDb, averagedSec: validSec }).ranges;
}
