import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type PixelColumns } from '../model/pixelColumns';
import { type Surface } from './surface';

/** LA90 to LA10 as a shaded band, a step a block of time; within the trace, in device pixels. */
export function drawPercentileBand(
  { context, palette, ratio }: Surface,
  pixels: PixelColumns,
  yOf: YOf,
): void {
  context.fillStyle = palette.percentiles;
  for (const { fromPx, toPx, la10, la90 } of stepsOf(pixels)) {
    const top = yOf(la10 / 100);
    context.fillRect(fromPx, top, toPx - fromPx, Math.max(ratio, yOf(la90 / 100) - top));
  }
}

/** LA50 as steps over everything else, in a halo of paper, for it lies where the line of LAeq is densest. */
export function drawMedian({ context, palette, ratio }: Surface, pixels: PixelColumns, yOf: YOf): void {
  const steps = stepsOf(pixels);
  for (const [colour, thickPx] of [
    [palette.paper, 3.5 * ratio],
    [palette.reed, 1.75 * ratio],
  ] as const) {
    context.fillStyle = colour;
    for (const { fromPx, toPx, la50 } of steps) {
      context.fillRect(fromPx, yOf(la50 / 100) - thickPx / 2, toPx - fromPx, thickPx);
    }
  }
}

type YOf = (levelDb: number) => number;

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
