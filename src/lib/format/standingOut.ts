import { bandAt, bandLabel, type BandFraction } from '#lib/acoustics/bands';
import { toTenths } from '#lib/acoustics/rounding';
import type { StandingOutRange } from '#lib/acoustics/standingOut';
import { tonalThresholdTenths } from '#lib/acoustics/tonality';
import { formatLevelDb } from './levels';
import { toneWords } from './tones';

/** Whether a range stands out as a tone. */
export function isTone({ reasons }: Pick<StandingOutRange, 'reasons'>): boolean {
  return reasons.includes('tone') || reasons.includes('tone-on-edge');
}

/**
 * What stands out, in a sentence without its full stop: "100 Hz band stands out by 15.8 dB: a tone between 89 and 112 Hz",
 * "100 Hz band is 12.3 dB above both neighbours; 15 dB would make it a tone".
 */
export function standingOutWords(range: StandingOutRange, fraction: BandFraction): string {
  const { lowerIndex, upperIndex, excessOverNeighboursDb } = range;
  if (isTone(range)) {
    const excessTenths = toTenths(excessOverNeighboursDb ?? 0);
    const { band, rest } = toneWords({ lowerIndex, upperIndex, excessTenths });
    return `${band} ${rest}`;
  }
  const threshold = fraction === 3 ? tonalThresholdTenths(lowerIndex) : null;
  const band = `${bandLabel(bandAt(fraction, lowerIndex))} ${fraction === 3 ? 'band' : 'octave'}`;
  const stands = `${band} is ${formatLevelDb(excessOverNeighboursDb)} dB above both neighbours`;
  return threshold === null ? stands : `${stands}; ${threshold / 10} dB would make it a tone`;
}
