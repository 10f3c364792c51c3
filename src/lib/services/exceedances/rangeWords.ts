import { bandAt, bandLabel, type BandFraction } from '#lib/acoustics/bands';
import type { StandingOutRange } from '#lib/acoustics/standingOut';
import { formatLevelDb } from '#lib/format/levels';
import { standingOutWords } from '#lib/format/standingOut';

/** What stands out in a sentence without its full stop, with how far it is above the usual level where that is why. */
export function rangeWords(range: StandingOutRange, fraction: BandFraction): string {
  const { reasons, excessOverUsualDb } = range;
  const isAboveUsual = reasons.includes('above-usual');
  const above = `${formatLevelDb(excessOverUsualDb)} dB above the usual level`;
  if (reasons.every((reason) => reason === 'above-usual')) return `${bandsOfRange(range, fraction)} ${above}`;
  const stands = standingOutWords(range, fraction);
  return isAboveUsual ? `${stands}; ${above}` : stands;
}

function bandsOfRange({ lowerIndex, upperIndex }: StandingOutRange, fraction: BandFraction): string {
  const unit = fraction === 3 ? 'band' : 'octave';
  const lowest = bandLabel(bandAt(fraction, lowerIndex));
  if (lowerIndex === upperIndex) return `${lowest} ${unit} is`;
  return `${lowest} to ${bandLabel(bandAt(fraction, upperIndex))} ${unit}s together are`;
}
