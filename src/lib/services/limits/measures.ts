import type { StationRow } from '#db/queries/stations';
import type { Band } from '#lib/acoustics/bands';
import { thirdsOfOctave } from '#lib/acoustics/octaves';

/** Whether a station has a band: its own, or an octave whose three thirds it has. */
export function measures(
  { bandFraction, firstBandIndex, lastBandIndex }: StationRow,
  { fraction, index }: Pick<Band, 'fraction' | 'index'>,
): boolean {
  if (bandFraction === 1 && fraction === 3) return false;
  const needed = bandFraction === fraction ? [index] : thirdsOfOctave(index);
  return needed.every((one) => firstBandIndex <= one && one <= lastBandIndex);
}
