import { typesetRuns } from '#lib/format/descriptors';
import { writeText, type Surface } from '../draw/surface';

const SIZE_PX = 12;
const SUBSCRIPT_PX = 9;
const SUBSCRIPT_DOWN_PX = 3;

/** Writes a line of 12 px in which descriptors are typeset, and answers its width, CSS pixels. */
export function writeTypeset(surface: Surface, text: string, x: number, y: number, colour: string): number {
  let at = x;
  const write = (part: string, sizePx: number, downPx: number) => {
    writeText(surface, part, at, y + downPx, { colour, sizePx });
    at += surface.context.measureText(part).width;
  };
  for (const run of typesetRuns(text)) {
    if (typeof run === 'string') {
      write(run, SIZE_PX, 0);
    } else {
      write(run.symbol, SIZE_PX, 0);
      write(run.subscript, SUBSCRIPT_PX, SUBSCRIPT_DOWN_PX);
    }
  }
  return at - x;
}
