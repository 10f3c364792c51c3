import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { type PeriodSums } from '#lib/acoustics/periodSums';

/** What LAeq and coverage are taken from: without the distributions that most of the work of whole sums goes into. */
export type EnergySums = Pick<PeriodSums, 'validSec' | 'excludedSec' | 'aEnergySec'>;

/** Sums of nothing. */
export function noEnergy(): EnergySums {
  return { validSec: 0, excludedSec: 0, aEnergySec: 0 };
}

/** Adds the sums of one period to those of another. */
export function addEnergy(into: EnergySums, { validSec, excludedSec, aEnergySec }: EnergySums): void {
  into.validSec += validSec;
  into.excludedSec += excludedSec;
  into.aEnergySec += aEnergySec;
}

/** LAeq in dB over the valid seconds; null when there are none. */
export function laeqDbOf({ aEnergySec, validSec }: EnergySums): number | null {
  return validSec === 0 ? null : levelOfEnergyDb(aEnergySec / validSec);
}
