import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type LevelRange } from '../model/levelAxis';
import { type PixelColumns } from '../model/pixelColumns';

/** How levels become colours. */
export interface Colouring {
  /** 256 RGBA quadruples, quiet to loud. */
  ramp: Uint8ClampedArray;
  range: LevelRange;
  /** Added to each band's unweighted level, hundredths of a dB: zeros in the Z view, A-weighting in the A view. */
  weightsCentiDb: readonly number[];
}

/**
 * Paints levels into RGBA pixels: one row a band, the highest on top, one column a pixel of the time axis. A pixel without a
 * level stays transparent, so that the hatching behind it shows.
 */
export function paintSpectrogram(pixels: PixelColumns, colouring: Colouring, rgba: Uint8ClampedArray): void {
  const { ramp, range, weightsCentiDb } = colouring;
  const colours = new Uint32Array(ramp.buffer, ramp.byteOffset, 256);
  const out = new Uint32Array(rgba.buffer, rgba.byteOffset, rgba.length / 4);
  const { widthPx, levelsCentiDb } = pixels;
  const bands = pixels.bands.length;
  const lowCentiDb = range.lowDb * 100;
  const perCentiDb = 255 / ((range.highDb - range.lowDb) * 100);
  for (let band = 0; band < bands; band += 1) {
    const offset = (weightsCentiDb[band] ?? 0) - lowCentiDb;
    let to = (bands - 1 - band) * widthPx;
    for (let at = band; at < levelsCentiDb.length; at += bands, to += 1) {
      const centiDb = levelsCentiDb[at] ?? NO_LEVEL_CENTI_DB;
      const step = (centiDb + offset) * perCentiDb;
      out[to] =
        centiDb === NO_LEVEL_CENTI_DB ? 0 : (colours[step < 0 ? 0 : step > 255 ? 255 : step | 0] ?? 0);
    }
  }
}
