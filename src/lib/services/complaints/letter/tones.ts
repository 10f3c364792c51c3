import { roundHalfUp } from '#lib/acoustics/rounding';
import type { StationEvidence, Tone } from '#lib/contracts/complaintEvidence';

/** Tones of the window's mean spectrum; that none stands out is said only where it could be assessed. */
export function tonesParagraph({ tonality, tones, sampleSeconds }: StationEvidence): string {
  if (tonality === 'octave-bands') {
    return 'The instrument there measures in bands too wide to tell whether a single tone stood out.';
  }
  if (tonality !== 'assessed') return '';
  const [first, ...others] = tones;
  if (!first) {
    const within =
      sampleSeconds === null ? '' : ' Averaged over the whole time, a short or wavering tone may not show.';
    return `No single tone stood out of the average spectrum of that time.${within}`;
  }
  const more = others.length === 0 ? '' : ` So did ${others.map(rangeInWords).join(' and ')}.`;
  return (
    `One range of pitch stood out of the average spectrum, ${rangeInWords(first)}: it was ${first.excess.toFixed(1)} dB above ` +
    `the ranges beside it, which is how a hum or a whine looks.${more} The measurement tells the range and not what made it.`
  );
}

function rangeInWords({ lowerHz, upperHz }: Tone): string {
  return `from ${hertz(lowerHz)} to ${hertz(upperHz)} Hz`;
}

function hertz(value: number): string {
  return String(roundHalfUp(value, value < 100 ? 1 : 0));
}
