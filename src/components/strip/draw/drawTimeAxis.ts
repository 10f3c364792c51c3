import { timeTicks } from '../model/timeTicks';
import { pxAtSec, type TimeView } from '../model/timeView';
import { type StripGeometry } from './geometry';
import { textWidth, writeText, type Surface } from './surface';

/** Clock and dates in the network's zone below the strip, and hairlines through it where a date begins. */
export function drawTimeAxis(surface: Surface, geometry: StripGeometry, view: TimeView, zone: string): void {
  const { context, palette, ratio } = surface;
  const { x, y, width, height } = geometry.axis;
  for (const tick of timeTicks(view, width, zone)) {
    const px = pxAtSec(view, width, tick.sec);
    const isDay = tick.kind === 'day';
    context.fillStyle = isDay ? palette.inkSoft : palette.line;
    const left = Math.round((x + px) * ratio) / ratio;
    context.fillRect(left, y - 4, 1 / ratio, 6);
    if (isDay) {
      context.fillStyle = palette.hatch;
      context.fillRect(left, geometry.trace.y, 1 / ratio, geometry.trace.height);
    }
    const half = textWidth(surface, tick.label) / 2;
    const middle = Math.min(width - half, Math.max(half - 20, px));
    writeText(surface, tick.label, x + middle, y + height / 2 + 2, {
      colour: isDay ? palette.ink : palette.inkSoft,
      align: 'center',
      weight: isDay ? 500 : 400,
    });
  }
}
