import { type Run } from '../model/runs';
import { pxAtSec, type TimeView } from '../model/timeView';
import { type StripGeometry } from './geometry';
import { textWidth, writeText, type Surface } from './surface';

/** "no data 22:40–07:10" in the gaps of the trace that have room for it. */
export function drawGapWords(
  surface: Surface,
  geometry: StripGeometry,
  view: TimeView,
  gaps: readonly Run[],
  wordsOf: (gap: Run) => string,
): void {
  const { x, y, width, height } = geometry.trace;
  for (const gap of gaps) {
    const from = Math.max(0, pxAtSec(view, width, gap.fromSec));
    const to = Math.min(width, pxAtSec(view, width, gap.toSec));
    const words = [wordsOf(gap), 'no data'].find((text) => textWidth(surface, text) + 12 <= to - from);
    if (!words) continue;
    writeText(surface, words, x + (from + to) / 2, y + height / 2, {
      colour: surface.palette.ochreText,
      align: 'center',
      plate: surface.palette.plate,
    });
  }
}
