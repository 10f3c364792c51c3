/** Bandwidth as a fraction of an octave: 1 = octave, 3 = one-third-octave. */
export type BandFraction = 1 | 3;

/** A fractional-octave band by IEC 61260-1:2014, base ten (G = 10^0.3), reference frequency 1 kHz. */
export interface Band {
  /** n of 1000·10^(n/10), for octaves too (a multiple of 3 there): 0 is 1 kHz, −3 is 500 Hz. */
  index: number;
  fraction: BandFraction;
  /** The label's frequency. Never calculate with it: it is up to 1 % off. */
  nominalHz: number;
  /** Mid-band frequency 1000·10^(n/10). */
  exactHz: number;
  /** Lower edge: exactHz·10^(−1/20) for thirds, ·10^(−3/20) for octaves. */
  lowerHz: number;
  /** Upper edge, which is the lower edge of the next band. */
  upperHz: number;
}

/** Index of the lowest stored band, 12.5 Hz. */
export const FIRST_BAND_INDEX = -19;
/** Index of the highest stored band, 20 kHz. */
export const LAST_BAND_INDEX = 13;
/** Number of absolute band indices, for arrays addressed by `bandSlot`. */
export const BAND_SLOTS = LAST_BAND_INDEX - FIRST_BAND_INDEX + 1;

/** Nominal frequencies in Hz of the thirds from index −19 on (IEC 61260-1:2014 Annex E). */
const NOMINAL_THIRDS_HZ = [
  12.5, 16, 20, 25, 31.5, 40, 50, 63, 80, 100, 125, 160, 200, 250, 315, 400, 500, 630, 800, 1000, 1250, 1600,
  2000, 2500, 3150, 4000, 5000, 6300, 8000, 10000, 12500, 16000, 20000,
] as const;

/** What people write for a nominal frequency, without spaces. */
const LABEL = /^(\d+(?:\.\d+)?)(k?)(?:hz)?$/i;

function makeBand(fraction: BandFraction, index: number, nominalHz: number): Band {
  const halfWidth = fraction === 3 ? 0.5 : 1.5;
  return {
    index,
    fraction,
    nominalHz,
    exactHz: 1000 * 10 ** (index / 10),
    lowerHz: 1000 * 10 ** ((index - halfWidth) / 10),
    upperHz: 1000 * 10 ** ((index + halfWidth) / 10),
  };
}

const THIRDS: readonly Band[] = NOMINAL_THIRDS_HZ.map((hz, i) => makeBand(3, FIRST_BAND_INDEX + i, hz));
const OCTAVES: readonly Band[] = THIRDS.filter((third) => third.index % 3 === 0).map((third) =>
  makeBand(1, third.index, third.nominalHz),
);

/** Place of a band index in arrays of `BAND_SLOTS`. */
export function bandSlot(index: number): number {
  return index - FIRST_BAND_INDEX;
}

/** Every band of a fraction in ascending order: 33 thirds 12.5 Hz–20 kHz, or 11 octaves 16 Hz–16 kHz. */
export function bandsOf(fraction: BandFraction): readonly Band[] {
  return fraction === 3 ? THIRDS : OCTAVES;
}

/** Whether a fraction has a band of this index. */
export function hasBand(fraction: BandFraction, index: number): boolean {
  return bandsOf(fraction).some((band) => band.index === index);
}

/** @throws RangeError when the fraction has no band of that index. */
export function bandAt(fraction: BandFraction, index: number): Band {
  const band = fraction === 3 ? THIRDS[index - FIRST_BAND_INDEX] : OCTAVES[(index + 18) / 3];
  if (!band)
    throw new RangeError(`There is no ${fraction === 3 ? 'one-third-octave' : 'octave'} band ${index}.`);
  return band;
}

/** The band with that label, or undefined when the fraction has none. */
export function bandByNominalHz(fraction: BandFraction, nominalHz: number): Band | undefined {
  return bandsOf(fraction).find((band) => band.nominalHz === nominalHz);
}

/**
 * The bands from one nominal frequency up to and including another.
 * @throws RangeError when either is no band of the fraction, or they are in descending order.
 */
export function bandRange(fraction: BandFraction, firstHz: number, lastHz: number): Band[] {
  const first = bandByNominalHz(fraction, firstHz);
  const last = bandByNominalHz(fraction, lastHz);
  if (!first || !last || first.index > last.index) {
    throw new RangeError(`${firstHz} Hz to ${lastHz} Hz is not a range of bands.`);
  }
  return bandsOf(fraction).filter((band) => first.index <= band.index && band.index <= last.index);
}

/** The band whose edges hold a frequency (lower edge included), or undefined outside the range. */
export function bandHolding(fraction: BandFraction, hz: number): Band | undefined {
  return bandsOf(fraction).find((band) => band.lowerHz <= hz && hz < band.upperHz);
}

/** A band's nominal frequency for people: "31.5 Hz", "3.15 kHz". */
export function bandLabel(band: Pick<Band, 'nominalHz'>): string {
  return band.nominalHz < 1000 ? `${band.nominalHz} Hz` : `${band.nominalHz / 1000} kHz`;
}

/** Nominal frequency in Hz read from what people write ("3.15k", "1 kHz", "250", "250 Hz"); undefined when it is none. */
export function parseBandLabel(text: string): number | undefined {
  const match = LABEL.exec(text.replace(/\s+/g, ''));
  if (!match?.[1]) return undefined;
  const kilo = match[2] !== '';
  // Nominal frequencies have one decimal at most; rounding there removes the binary remainder of the product.
  return kilo ? Math.round(Number(match[1]) * 10000) / 10 : Number(match[1]);
}
