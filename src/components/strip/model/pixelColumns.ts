import { energyOfCentiDb } from '#lib/acoustics/energy';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type Band } from '#lib/acoustics/bands';
import { endOfColumnsSec, type StripColumns } from './stripColumns';
import { spanSec, type TimeView } from './timeView';

/** What each device pixel of the time axis shows. Levels are hundredths of a dB, −32768 = none. */
export interface PixelColumns {
  widthPx: number;
  bands: readonly Band[];
  /** Energy mean of the pixel's columns. */
  laeqCentiDb: Int16Array;
  laeqLowCentiDb: Int16Array;
  laeqHighCentiDb: Int16Array;
  lafmaxCentiDb: Int16Array;
  /** Of the block of time that the pixel's middle lies in. */
  la10CentiDb: Int16Array;
  la50CentiDb: Int16Array;
  la90CentiDb: Int16Array;
  /** Band levels, pixel after pixel: energy means. */
  levelsCentiDb: Int16Array;
  /** 1 where the fetched columns reach, whether or not they hold data: elsewhere nothing is known yet. */
  isKnown: Uint8Array;
}

/**
 * Resamples columns to the pixels of an axis. Where layers overlap the first one of the list shows, so that the
 * old picture stays until the wanted one is there. A pixel that is shorter than a column shows the column (nearest neighbour); one that
 * spans several shows their energy mean and, for LAeq, their range. Layers must have the same bands.
 */
export function pixelColumns(layers: readonly StripColumns[], view: TimeView, widthPx: number): PixelColumns {
  const bands = layers[0]?.bands ?? [];
  const pixels = emptyPixels(widthPx, bands);
  const energies = new Float64Array(bands.length);
  const counts = new Uint32Array(bands.length);
  const pixelSec = spanSec(view) / widthPx;
  for (let px = 0; px < widthPx; px += 1) {
    const fromSec = view.fromSec + px * pixelSec;
    const middleSec = fromSec + pixelSec / 2;
    const layer = layers.find((l) => l.fromSec <= middleSec && middleSec < endOfColumnsSec(l));
    if (!layer) continue;
    pixels.isKnown[px] = 1;
    const range = columnsOfPixel(layer, fromSec, pixelSec);
    fillLevels(pixels, px, layer, range);
    fillPercentiles(pixels, px, layer, Math.floor((range.from + range.to) / 2));
    fillBands(pixels, px, layer, range, { energies, counts });
  }
  return pixels;
}

interface ColumnRange {
  from: number;
  to: number;
}

function columnsOfPixel(layer: StripColumns, fromSec: number, pixelSec: number): ColumnRange {
  if (pixelSec <= layer.stepSec) {
    const at = Math.floor((fromSec + pixelSec / 2 - layer.fromSec) / layer.stepSec);
    return { from: at, to: at + 1 };
  }
  const from = Math.max(0, Math.floor((fromSec - layer.fromSec) / layer.stepSec));
  const to = Math.floor((fromSec + pixelSec - layer.fromSec) / layer.stepSec);
  return { from, to: Math.min(layer.count, Math.max(from + 1, to)) };
}

function fillLevels(pixels: PixelColumns, px: number, layer: StripColumns, { from, to }: ColumnRange): void {
  let energySec = 0;
  let seconds = 0;
  let low = Infinity;
  let high = -Infinity;
  let max = NO_LEVEL_CENTI_DB;
  for (let i = from; i < to; i += 1) {
    const laeq = layer.laeqCentiDb[i] ?? NO_LEVEL_CENTI_DB;
    max = Math.max(max, layer.lafmaxCentiDb[i] ?? NO_LEVEL_CENTI_DB);
    if (laeq === NO_LEVEL_CENTI_DB) continue;
    const weightSec = layer.presentSec[i] ?? 0;
    energySec += energyOfCentiDb(laeq) * weightSec;
    seconds += weightSec;
    low = Math.min(low, laeq);
    high = Math.max(high, laeq);
  }
  pixels.lafmaxCentiDb[px] = max;
  if (seconds === 0) return;
  pixels.laeqCentiDb[px] = Math.round(1000 * Math.log10(energySec / seconds));
  pixels.laeqLowCentiDb[px] = low;
  pixels.laeqHighCentiDb[px] = high;
}

/** Exceedance levels do not average: a pixel shows those of one of its columns. */
function fillPercentiles(
  pixels: PixelColumns,
  px: number,
  { percentiles, laeqCentiDb }: StripColumns,
  at: number,
): void {
  if (!percentiles || laeqCentiDb[at] === NO_LEVEL_CENTI_DB) return;
  pixels.la10CentiDb[px] = percentiles.la10CentiDb[at] ?? NO_LEVEL_CENTI_DB;
  pixels.la50CentiDb[px] = percentiles.la50CentiDb[at] ?? NO_LEVEL_CENTI_DB;
  pixels.la90CentiDb[px] = percentiles.la90CentiDb[at] ?? NO_LEVEL_CENTI_DB;
}

interface Scratch {
  energies: Float64Array;
  counts: Uint32Array;
}

function fillBands(
  pixels: PixelColumns,
  px: number,
  layer: StripColumns,
  { from, to }: ColumnRange,
  { energies, counts }: Scratch,
): void {
  const bands = layer.bands.length;
  if (to - from === 1) {
    pixels.levelsCentiDb.set(layer.levelsCentiDb.subarray(from * bands, to * bands), px * bands);
    return;
  }
  energies.fill(0);
  counts.fill(0);
  for (let at = from * bands; at < to * bands;) {
    for (let band = 0; band < bands; band += 1, at += 1) {
      const centiDb = layer.levelsCentiDb[at] ?? NO_LEVEL_CENTI_DB;
      if (centiDb === NO_LEVEL_CENTI_DB) continue;
      energies[band] = (energies[band] ?? 0) + energyOfCentiDb(centiDb);
      counts[band] = (counts[band] ?? 0) + 1;
    }
  }
  for (let band = 0; band < bands; band += 1) {
    const count = counts[band] ?? 0;
    if (count === 0) continue;
    pixels.levelsCentiDb[px * bands + band] = Math.round(1000 * Math.log10((energies[band] ?? 0) / count));
  }
}

function emptyPixels(widthPx: number, bands: readonly Band[]): PixelColumns {
  const none = () => new Int16Array(widthPx).fill(NO_LEVEL_CENTI_DB);
  return {
    widthPx,
    bands,
    laeqCentiDb: none(),
    laeqLowCentiDb: none(),
    laeqHighCentiDb: none(),
    lafmaxCentiDb: none(),
    la10CentiDb: none(),
    la50CentiDb: none(),
    la90CentiDb: none(),
    levelsCentiDb: new Int16Array(widthPx * bands.length).fill(NO_LEVEL_CENTI_DB),
    isKnown: new Uint8Array(widthPx),
  };
}
