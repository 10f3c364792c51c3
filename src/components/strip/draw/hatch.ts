import { type Surface } from './surface';

/** Diagonal lines for "no data": a pattern in device pixels that stands still when the picture moves. */
export function hatchPattern({ context, ratio, palette, hatchFill }: Surface): CanvasPattern | string {
  if (hatchFill !== undefined) return hatchFill;
  const size = Math.round(7 * ratio);
  const tile = document.createElement('canvas');
  tile.width = size;
  tile.height = size;
  const on = tile.getContext('2d');
  if (!on) return palette.hatch;
  on.strokeStyle = palette.hatch;
  on.lineWidth = ratio;
  on.beginPath();
  for (const shift of [-size, 0, size]) {
    on.moveTo(shift - 1, size + 1);
    on.lineTo(shift + size + 1, -1);
  }
  on.stroke();
  return context.createPattern(tile, 'repeat') ?? palette.hatch;
}
