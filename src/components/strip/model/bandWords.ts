import { bandAt, bandLabel } from '#lib/acoustics/bands';
import { type BandSelection } from './selection';

/** "80–125 Hz", "800 Hz–1.25 kHz", "100 Hz": the nominal frequencies that a selection spans. */
export function bandRangeWords({ fraction, lowestIndex, highestIndex }: BandSelection): string {
  const lowest = bandAt(fraction, lowestIndex);
  const highest = bandAt(fraction, highestIndex);
  const octave = fraction === 1 ? ' octave' : '';
  if (lowestIndex === highestIndex) return bandLabel(lowest) + octave;
  if (highest.nominalHz < 1000) return `${lowest.nominalHz}–${bandLabel(highest)}${octave && `${octave}s`}`;
  return `${bandLabel(lowest)}–${bandLabel(highest)}${octave && `${octave}s`}`;
}
