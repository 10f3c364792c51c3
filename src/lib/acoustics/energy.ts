import { MAX_SUM_CENTI_DB, MIN_LEVEL_CENTI_DB } from './levelRange';

/** Relative sound energy: the mean square pressure over (20 µPa)², 10^(L/10). Sums and means are taken of these only. */
export type Energy = number;

/** Level of the table's first entry; a constant of this module's own, because a lookup of it is on the hottest path. */
const TABLE_FROM_CENTI_DB = MIN_LEVEL_CENTI_DB;

/** 10^(L/10) over every storable level: a lookup costs a thirtieth of `pow` on a month of band levels. */
const ENERGY_OF_CENTI_DB = Float64Array.from(
  { length: MAX_SUM_CENTI_DB - TABLE_FROM_CENTI_DB + 1 },
  (_, offset) => 10 ** ((TABLE_FROM_CENTI_DB + offset) / 1000),
);

/**
 * Relative energy of a stored level in integer hundredths of a dB.
 * @throws RangeError outside the stored range or when not an integer (so a "no level" marker can never enter a sum).
 */
export function energyOfCentiDb(centiDb: number): Energy {
  const energy = ENERGY_OF_CENTI_DB[centiDb - TABLE_FROM_CENTI_DB];
  if (energy === undefined) {
    throw new RangeError(`${centiDb} is not a stored level in hundredths of a dB; leave missing levels out.`);
  }
  return energy;
}

/** Relative energy of a level in dB. */
export function energyOfDb(levelDb: number): Energy {
  return 10 ** (levelDb / 10);
}

/**
 * Level in dB of a relative energy; null for 0, because no energy means that nothing contributed, not silence.
 * @throws RangeError for a negative or undefined energy.
 */
export function levelOfEnergyDb(energy: Energy): number | null {
  if (!(energy >= 0)) throw new RangeError(`${energy} is not an energy.`);
  return energy === 0 ? null : 10 * Math.log10(energy);
}

/** Level in dB of incoherent sources together, 10 lg Σ10^(L/10); null for none. */
export function energySumDb(levelsDb: readonly number[]): number | null {
  return levelOfEnergyDb(levelsDb.reduce((sum, levelDb) => sum + energyOfDb(levelDb), 0));
}

/**
 * Equivalent level in dB of intervals: 10 lg of the mean of 10^(L/10), weighted by `weightsSec` (each interval's seconds;
 * all equal when left out). Null when nothing has weight.
 * @throws RangeError when the weights do not match the levels or one is negative.
 */
export function energyMeanDb(levelsDb: readonly number[], weightsSec?: readonly number[]): number | null {
  if (weightsSec && weightsSec.length !== levelsDb.length) {
    throw new RangeError(`${levelsDb.length} levels with ${weightsSec.length} weights.`);
  }
  let energySec = 0;
  let totalSec = 0;
  levelsDb.forEach((levelDb, i) => {
    const weightSec = weightsSec?.[i] ?? 1;
    if (!(weightSec >= 0)) throw new RangeError(`${weightSec} s is not a duration.`);
    energySec += energyOfDb(levelDb) * weightSec;
    totalSec += weightSec;
  });
  return totalSec === 0 ? null : levelOfEnergyDb(energySec / totalSec);
}
