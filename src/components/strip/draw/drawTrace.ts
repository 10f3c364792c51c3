import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { drawMedian, drawPercentileBand } from './drawPercentiles';
import { levelTicks, pxOfLevel, type LevelRange } from '../model/levelAxis';
import { type PixelColumns } from '../model/pixelColumns';
import { type Run } from '../model/runs';
import { pxAtSec, type TimeView } from '../model/timeView';
import { hatchGaps } from './drawSpectrogram';
import { type StripGeometry } from './geometry';
import { within, writeText, type Surface } from './surface';

export interface TracePicture {
  pixels: PixelColumns;
  view: TimeView;
  range: LevelRange;
  /** Stretches whose data do not count: drawn on a wash. */
  leftOut: readonly Run[];
  elapsedPx: number;
}

/** LAeq as a line of ink (its range where a pixel spans several columns) on a light envelope up to LAFmax; LA90 to LA10 behind it, LA50 before it. */
export function drawTrace(surface: Surface, geometry: StripGeometry, picture: TracePicture): void {
  const { palette, context, ratio } = surface;
  const { x, y, width, height } = geometry.trace;
  const { pixels, range } = picture;
  for (const db of levelTicks(range, height, 22)) {
    const at = y + pxOfLevel(range, height, db);
    context.fillStyle = palette.line;
    context.fillRect(x, Math.round(at * ratio) / ratio, width, 1 / ratio);
    writeText(surface, String(db), x - 8, at, { colour: palette.inkSoft, align: 'right' });
  }
  writeText(surface, 'dB', x - 8, y + 6, { colour: palette.inkSoft, align: 'right' });
  within(surface, geometry.trace, (device) => {
    washRuns(surface, picture, device.width, device.height);
    hatchGaps(surface, pixels, picture.elapsedPx, device.height);
    const yOf = (db: number) => pxOfLevel(range, device.height, db);
    drawEnvelope(surface, pixels, yOf);
    drawPercentileBand(surface, pixels, yOf);
    drawLine(surface, pixels, yOf);
    drawMedian(surface, pixels, yOf);
  });
}

function washRuns(surface: Surface, { view, leftOut }: TracePicture, width: number, height: number): void {
  surface.context.fillStyle = surface.palette.wash;
  for (const run of leftOut) {
    const from = pxAtSec(view, width, run.fromSec);
    surface.context.fillRect(from, 0, Math.max(1, pxAtSec(view, width, run.toSec) - from), height);
  }
}

function drawEnvelope(surface: Surface, pixels: PixelColumns, yOf: (levelDb: number) => number): void {
  surface.context.fillStyle = surface.palette.envelope;
  for (let px = 0; px < pixels.widthPx; px += 1) {
    const max = pixels.lafmaxCentiDb[px] ?? NO_LEVEL_CENTI_DB;
    const laeq = pixels.laeqCentiDb[px] ?? NO_LEVEL_CENTI_DB;
    if (max === NO_LEVEL_CENTI_DB || laeq === NO_LEVEL_CENTI_DB) continue;
    const top = yOf(max / 100);
    surface.context.fillRect(px, top, 1, yOf(laeq / 100) - top);
  }
}

function drawLine(surface: Surface, pixels: PixelColumns, yOf: (levelDb: number) => number): void {
  const { context, palette, ratio } = surface;
  context.strokeStyle = palette.ink;
  context.lineWidth = ratio;
  context.lineJoin = 'round';
  context.beginPath();
  let isDrawing = false;
  for (let px = 0; px < pixels.widthPx; px += 1) {
    const high = pixels.laeqHighCentiDb[px] ?? NO_LEVEL_CENTI_DB;
    const low = pixels.laeqLowCentiDb[px] ?? NO_LEVEL_CENTI_DB;
    if (high === NO_LEVEL_CENTI_DB) {
      isDrawing = false;
      continue;
    }
    if (isDrawing) context.lineTo(px + 0.5, yOf(high / 100));
    else context.moveTo(px + 0.1, yOf(high / 100));
    context.lineTo(px + 0.6, yOf(low / 100));
    isDrawing = true;
  }
  context.stroke();
}
