import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type PixelColumns } from '../model/pixelColumns';
import { type Surface } from './surface';

/** A step of LA50 that is narrower than this would hide the trace that it is laid over. */
const LEAST_OVER_PX = 6;
const MEDIAN_PX = 1.75;
const HALO_PX = 3.5;

/** LA90 to LA10 as a shaded band, a step a block of time, with LA50 where its steps are narrow; in device pixels of the trace. */
export function drawPercentileBand(surface: Surface, pixels: PixelColumns, yOf: YOf): void {
  const { context, palette, ratio } = surface;
  const steps = stepsOf(pixels);
  context.fillStyle = palette.percentiles;
  for (const { fromPx, toPx, la10, la90 } of steps) {
    const top = yOf(la10 / 100);
    context.fillRect(fromPx, top, toPx - fromPx, Math.max(ratio, yOf(la90 / 100) - top));
  }
  const narrow = steps.filter((step) => !isWide(step, ratio));
  fillMedian(surface, narrow, yOf, palette.reed, MEDIAN_PX);
}

/** LA50 where its steps are wide: over everything else, in a halo of paper, for it lies where the line of LAeq is densest. */
export function drawMedian(surface: Surface, pixels: PixelColumns, yOf: YOf): void {
  const { palette, ratio } = surface;
  const wide = stepsOf(pixels).filter((step) => isWide(step, ratio));
  fillMedian(surface, wide, yOf, palette.paper, HALO_PX);
  fillMedian(surface, wide, yOf, palette.reed, MEDIAN_PX);
}

function fillMedian(
  { context, ratio }: Surface,
  steps: readonly Step[],
  yOf: YOf,
  colour: string,
  thicknessPx: number,
): void {
  const thick = thicknessPx * ratio;
  context.fillStyle = colour;
  for (const { fromPx, toPx, la50 } of steps) {
    context.fillRect(fromPx, yOf(la50 / 100) - thick / 2, toPx - fromPx, thick);
  }
}

function isWide({ fromPx, toPx }: Step, ratio: number): boolean {
  return toPx - fromPx >= LEAST_OVER_PX * ratio;
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
