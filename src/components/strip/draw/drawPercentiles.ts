import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type PixelColumns } from '../model/pixelColumns';
import { type Surface } from './surface';

/** LA90 to LA10 as a shaded band with LA50 as a line in it, a step a block of time; within the trace, in device pixels. */
export function drawPercentiles(
  { context, palette, ratio }: Surface,
  pixels: PixelColumns,
  yOf: (levelDb: number) => number,
): void {
  for (const step of stepsOf(pixels)) {
    const width = step.toPx - step.fromPx;
    const top = yOf(step.la10 / 100);
    context.fillStyle = palette.percentiles;
    context.fillRect(step.fromPx, top, width, Math.max(ratio, yOf(step.la90 / 100) - top));
  }
  // Apart from the band, so that a drawing in vectors can join equal rectangles.
  context.fillStyle = palette.reed;
  for (const step of stepsOf(pixels)) {
    const thickPx = 1.5 * ratio;
    context.fillRect(step.fromPx, yOf(step.la50 / 100) - thickPx / 2, step.toPx - step.fromPx, thickPx);
  }
}

interface Step {
  fromPx: number;
  toPx: number;
  la10: number;
  la50: number;
  la90: number;
}

/** Pixels beside one another that show the same levels, as one; those without are left out. */
function stepsOf(pixels: PixelColumns): Step[] {
  const steps: Step[] = [];
  for (let px = 0; px < pixels.widthPx; px += 1) {
    const la10 = pixels.la10CentiDb[px] ?? NO_LEVEL_CENTI_DB;
    const la50 = pixels.la50CentiDb[px] ?? NO_LEVEL_CENTI_DB;
    const la90 = pixels.la90CentiDb[px] ?? NO_LEVEL_CENTI_DB;
    if (la10 === NO_LEVEL_CENTI_DB || la50 === NO_LEVEL_CENTI_DB || la90 === NO_LEVEL_CENTI_DB) continue;
    const last = steps.at(-1);
    if (last?.toPx === px && last.la10 === la10 && last.la50 === la50 && last.la90 === la90)
      last.toPx = px + 1;
    else steps.push({ fromPx: px, toPx: px + 1, la10, la50, la90 });
  }
  return steps;
}
