import { type DrawContext, type Surface } from './surface';

/** Patterns of each canvas by their size and colour: a picture in motion needs its own several times a frame. */
const patterns = new WeakMap<DrawContext, Map<string, CanvasPattern>>();

/** Diagonal lines for "no data": a pattern in device pixels that stands still when the picture moves. */
export function hatchPattern({ context, ratio, palette, hatchFill }: Surface): CanvasPattern | string {
  if (hatchFill !== undefined) return hatchFill;
  const known = patterns.get(context) ?? new Map<string, CanvasPattern>();
  patterns.set(context, known);
  const key = `${ratio} ${palette.hatch}`;
  const pattern = known.get(key) ?? makePattern(context, ratio, palette.hatch);
  if (!pattern) return palette.hatch;
  known.set(key, pattern);
  return pattern;
}

function makePattern(context: DrawContext, ratio: number, colour: string): CanvasPattern | null {
  const size = Math.round(7 * ratio);
  const tile = document.createElement('canvas');
  tile.width = size;
  tile.height = size;
  const on = tile.getContext('2d');
  if (!on) return null;
  on.strokeStyle = colour;
  on.lineWidth = ratio;
  on.beginPath();
  for (const shift of [-size, 0, size]) {
    on.moveTo(shift - 1, size + 1);
    on.lineTo(shift + size + 1, -1);
  }
  on.stroke();
  return context.createPattern(tile, 'repeat');
}
