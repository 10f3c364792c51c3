import { type Corner } from './dragSelection';
import { spanSec, type TimeView } from './timeView';

interface Keyboard {
  view: TimeView;
  /** Length of the columns on the screen. */
  stepSec: number;
  bandCount: number;
  isShift: boolean;
}

/** Steps that an arrow moves with shift. */
const BIG_STEP = 10;
const BIG_BAND_STEP = 3;

/** The shortest move that is seen: a four-hundredth of the view, in whole columns. */
function smallStepSec({ view, stepSec }: Keyboard): number {
  return Math.max(1, Math.round(spanSec(view) / 400 / stepSec)) * stepSec;
}

/** Where the cursor goes by a key, kept within the view; null when the key does not move it. */
export function movedCursor(cursor: Corner | null, key: string, keyboard: Keyboard): Corner | null {
  const { view, stepSec, bandCount, isShift } = keyboard;
  const start: Corner = cursor ?? { sec: (view.fromSec + view.toSec) / 2, bandAt: null };
  const timeStepSec = smallStepSec(keyboard) * (isShift ? BIG_STEP : 1);
  const bandStep = isShift ? BIG_BAND_STEP : 1;
  const atTime = (sec: number): Corner => {
    const within = Math.min(view.toSec - stepSec / 2, Math.max(view.fromSec + stepSec / 2, sec));
    return { ...start, sec: (Math.floor(within / stepSec) + 0.5) * stepSec };
  };
  switch (key) {
    case 'ArrowLeft':
      return atTime(start.sec - timeStepSec);
    case 'ArrowRight':
      return atTime(start.sec + timeStepSec);
    case 'Home':
      return atTime(view.fromSec);
    case 'End':
      return atTime(view.toSec);
    case 'ArrowUp':
      return {
        ...start,
        bandAt: start.bandAt === null ? 0 : Math.min(bandCount - 1, start.bandAt + bandStep),
      };
    case 'ArrowDown':
      // Below the lowest band the cursor stands on the level trace: all bands.
      return {
        ...start,
        bandAt: start.bandAt === null || start.bandAt < bandStep ? null : start.bandAt - bandStep,
      };
    default:
      return null;
  }
}
