import { type PeriodSums } from '#lib/acoustics/periodSums';

/** Samples × min(N, 100 − N) that an exceedance level needs; the acoustic core's own rule in words. */
const SAMPLES_TIMES_PERCENT = 300;

/** How many base samples the level exceeded `percent` % of the time needs. */
export function samplesNeeded(percent: number): number {
  return Math.ceil(SAMPLES_TIMES_PERCENT / Math.min(percent, 100 - percent));
}

/** Why there is no level exceeded `percent` % of the time, in words. */
export function missingExceedance(
  percent: number,
  { validSec, sampleSec, isSampleMixed }: Pick<PeriodSums, 'validSec' | 'sampleSec' | 'isSampleMixed'>,
): string {
  if (validSec === 0) return 'No valid data in this period.';
  if (isSampleMixed || sampleSec === null) {
    return 'Intervals of different lengths are mixed, so there is no one kind of sample.';
  }
  return `It takes ${samplesNeeded(percent)} samples of ${sampleSec} s; there are ${Math.floor(validSec / sampleSec)}.`;
}
