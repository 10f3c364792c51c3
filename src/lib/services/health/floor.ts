import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { type FloorDb } from './evidence';
import { medianOf } from './contentRules';

const DAY_SEC = 86_400;
/** How far back the usual quiet is looked for. */
export const USUAL_DAYS = 14;
/** Half a day of quarter-hours, and three such days, make a usual quiet. */
const LEAST_QUARTERS = 48;
const LEAST_DAYS = 3;
const LOWEST_SHARE = 0.1;

interface Quarter {
  startSec: number;
  validSec: number;
  lafminCentiDb: number | null;
  aEnergySec: number;
}

/**
 * The quiet of the 24 hours before `endSec`, and the usual one: the median of the fortnight before, day by day. A day's quiet is
 * the level that its quietest tenth of quarter-hours keeps below: of their LAFmin, or of their LAeq where any of them has no LAFmin.
 */
export function floorsOf(quarters: readonly Quarter[], endSec: number): { lastDay: FloorDb; usual: FloorDb } {
  const valid = quarters.filter(({ validSec }) => validSec > 0);
  const byMinimum = valid.every(({ lafminCentiDb }) => lafminCentiDb !== null);
  const dayFloor = (daysBefore: number) => {
    const toSec = endSec - daysBefore * DAY_SEC;
    const ofDay = valid.filter(({ startSec }) => startSec >= toSec - DAY_SEC && startSec < toSec);
    return floorOf(ofDay, byMinimum);
  };
  const before = Array.from({ length: USUAL_DAYS }, (_, at) => dayFloor(at + 1)).filter(
    (floor) => floor !== null,
  );
  return { lastDay: dayFloor(0), usual: before.length < LEAST_DAYS ? null : medianOf(before) };
}

function floorOf(quarters: readonly Quarter[], byMinimum: boolean): FloorDb {
  if (quarters.length < LEAST_QUARTERS) return null;
  const levels = quarters.map(({ lafminCentiDb, aEnergySec, validSec }) =>
    byMinimum && lafminCentiDb !== null ? lafminCentiDb / 100 : (levelOfEnergyDb(aEnergySec / validSec) ?? 0),
  );
  return levels.toSorted((a, b) => a - b)[Math.floor(levels.length * LOWEST_SHARE)] ?? null;
}
