import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { bandTicks } from '../model/bandAxis';
import { type PixelColumns } from '../model/pixelColumns';
import { type StripGeometry } from './geometry';
import { hatchPattern } from './hatch';
import { paintSpectrogram, type Colouring } from './paintSpectrogram';
import { within, writeText, type Surface } from './surface';

/** Below the lowest label, for the unit to stand apart from it. */
const UNIT_ROOM_PX = 22;

/** Bands upward over time. `elapsedPx`: device pixels of the axis that have passed; what lies beyond is left blank. */
export function drawSpectrogram(
  surface: Surface,
  geometry: StripGeometry,
  pixels: PixelColumns,
  colouring: Colouring | null,
  elapsedPx: number,
): void {
  const { context, palette } = surface;
  within(surface, geometry.spectrogram, ({ width, height }) => {
    hatchGaps(surface, pixels, elapsedPx, height);
    const image = colouring && spectrogramImage(pixels, colouring);
    if (!image) return;
    context.imageSmoothingEnabled = false;
    context.drawImage(image, 0, 0, width, height);
  });
  const { x, y, height } = geometry.spectrogram;
  const ticks = bandTicks(pixels.bands, height, 18);
  const lowestPx = ticks[0]?.yPx ?? 0;
  if (height - lowestPx > UNIT_ROOM_PX) {
    writeText(surface, 'Hz', x - 8, y + height - 8, { colour: palette.inkSoft, align: 'right' });
  }
  for (const tick of ticks) {
    writeText(surface, tick.label, x - 8, y + tick.yPx, { colour: palette.inkSoft, align: 'right' });
  }
}

/** What levels are painted into before they are drawn; one for all, since each is drawn at once. */
let scratch: HTMLCanvasElement | undefined;

function spectrogramImage(pixels: PixelColumns, colouring: Colouring): HTMLCanvasElement | null {
  if (pixels.bands.length === 0) return null;
  scratch ??= document.createElement('canvas');
  const image = scratch;
  // Setting a size, even the same one, makes a canvas anew.
  if (image.width !== pixels.widthPx) image.width = pixels.widthPx;
  if (image.height !== pixels.bands.length) image.height = pixels.bands.length;
  const context = image.getContext('2d', { willReadFrequently: true });
  if (!context) return null;
  const data = context.createImageData(image.width, image.height);
  paintSpectrogram(pixels, colouring, data.data);
  context.putImageData(data, 0, 0);
  return image;
}

/** Hatches the pixels that were asked for, have passed, and hold nothing. */
export function hatchGaps(surface: Surface, pixels: PixelColumns, elapsedPx: number, height: number): void {
  const { context } = surface;
  context.fillStyle = hatchPattern(surface);
  let from: number | null = null;
  for (let px = 0; px <= pixels.widthPx; px += 1) {
    const isGap =
      px < Math.min(elapsedPx, pixels.widthPx) &&
      pixels.isKnown[px] === 1 &&
      pixels.laeqCentiDb[px] === NO_LEVEL_CENTI_DB;
    if (isGap) from ??= px;
    else if (from !== null) {
      context.fillRect(from, 0, px - from, height);
      from = null;
    }
  }
}
