import { bandAt, bandLabel } from '#lib/acoustics/bands';
import { type TonalAssessment, type TonalFinding } from '#lib/acoustics/tonality';

/** A tonal finding in words: what stands out and by how much, then what can be concluded. */
export interface ToneWords {
  band: string;
  rest: string;
}

/**
 * "100 Hz band stands out" · "by 15.8 dB: a tone between 89 and 112 Hz". A band tells a range of frequencies (its edges), never
 * a frequency.
 */
export function toneWords(
  finding: Pick<TonalFinding, 'lowerIndex' | 'upperIndex' | 'excessTenths'>,
): ToneWords {
  const lower = bandAt(3, finding.lowerIndex);
  const upper = bandAt(3, finding.upperIndex);
  const by = `by ${(finding.excessTenths / 10).toFixed(1)} dB`;
  const between = `between ${frequencyRange(lower.lowerHz, upper.upperHz)}`;
  if (finding.lowerIndex === finding.upperIndex) {
    return { band: `${bandLabel(lower)} band stands out`, rest: `${by}: a tone ${between}` };
  }
  return {
    band: `${bandLabel(lower)} and ${bandLabel(upper)} bands stand out together`,
    rest: `${by}: a tone ${between}, on the edge of both (a test of Bittern’s own)`,
  };
}

/** Why a spectrum says nothing about tones, in words. */
export function notAssessableWords(
  reason: Extract<TonalAssessment, { kind: 'not-assessable' }>['reason'],
): string {
  const because = {
    'octave-bands': 'octave bands are too wide for it',
    'no-neighbours': 'no band has levels on both its sides',
    'averaged-too-short': 'it takes at least 60 s of valid data',
  }[reason];
  return `Tones cannot be assessed here: ${because}.`;
}

/** "89 and 112 Hz", "891 Hz and 1.12 kHz": edges to three digits at most, never finer than 1 Hz. */
function frequencyRange(lowerHz: number, upperHz: number): string {
  if (upperHz < 999.5) return `${Math.round(lowerHz)} and ${Math.round(upperHz)} Hz`;
  if (lowerHz >= 999.5) return `${kilo(lowerHz)} and ${kilo(upperHz)} kHz`;
  return `${Math.round(lowerHz)} Hz and ${kilo(upperHz)} kHz`;
}

function kilo(hz: number): string {
  return String(Number((hz / 1000).toPrecision(3)));
}
