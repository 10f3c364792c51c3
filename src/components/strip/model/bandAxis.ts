import { type Band } from '#lib/acoustics/bands';

/** A band's label on the frequency axis; `yPx` is its middle, from the top. */
export interface BandTick {
  band: Band;
  yPx: number;
  label: string;
}

/** Row of a band counted from the top, where the highest band is. */
export function rowOfBand(bands: readonly Band[], at: number): number {
  return bands.length - 1 - at;
}

/** Place in `bands` of the band at a height of the spectrogram, kept within it. */
export function bandAtPx(bands: readonly Band[], heightPx: number, yPx: number): number {
  const row = Math.floor((yPx / heightPx) * bands.length);
  return bands.length - 1 - Math.min(bands.length - 1, Math.max(0, row));
}

/** Short label of a nominal frequency: "31.5", "1k", "3.15k". */
function shortHz(nominalHz: number): string {
  return nominalHz < 1000 ? String(nominalHz) : `${nominalHz / 1000}k`;
}

/** Labels of the octaves' mid-bands, every one or every second or third, as many as keep `leastPx` between them. */
export function bandTicks(bands: readonly Band[], heightPx: number, leastPx: number): BandTick[] {
  const rowPx = heightPx / Math.max(1, bands.length);
  const octavePx = rowPx * (bands[0]?.fraction === 1 ? 1 : 3);
  const everyOctaves = Math.max(1, Math.ceil(leastPx / octavePx));
  return bands.flatMap((band, at) =>
    band.index % (3 * everyOctaves) === 0
      ? [{ band, yPx: (rowOfBand(bands, at) + 0.5) * rowPx, label: shortHz(band.nominalHz) }]
      : [],
  );
}
