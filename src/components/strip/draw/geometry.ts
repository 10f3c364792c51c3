/** A rectangle in CSS pixels from the strip's top left. */
export interface Rect {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** Where the parts of the strip lie. They share `x` and `width`: one time axis. */
export interface StripGeometry {
  width: number;
  height: number;
  isNarrow: boolean;
  spectrogram: Rect;
  marks: Rect;
  trace: Rect;
  /** The validity strip's rows, and the row of complaints below them. */
  lanes: Rect;
  laneHeight: number;
  complaints: Rect;
  axis: Rect;
}

const LANES = 5;
/** Width below which a strip is less tall and has a thinner margin. */
export const NARROW_PX = 560;
const COMPLAINTS_PX = 24;

/** The parts for a strip `width` CSS pixels wide: less tall and with a thinner margin where it is narrow. */
export function stripGeometry(width: number): StripGeometry {
  const isNarrow = width < NARROW_PX;
  const left = isNarrow ? 50 : 58;
  const plotWidth = Math.max(80, width - left - 1);
  const laneHeight = 13;
  const part = (y: number, height: number): Rect => ({ x: left, y, width: plotWidth, height });
  const spectrogram = part(0, isNarrow ? 217 : 279);
  const marks = part(spectrogram.height, 20);
  const trace = part(marks.y + marks.height, isNarrow ? 130 : 140);
  const lanes = part(trace.y + trace.height + 10, LANES * laneHeight + COMPLAINTS_PX);
  const complaints = part(lanes.y + LANES * laneHeight, COMPLAINTS_PX);
  const axis = part(lanes.y + lanes.height + 4, 24);
  return {
    width,
    height: axis.y + axis.height,
    isNarrow,
    spectrogram,
    marks,
    trace,
    lanes,
    laneHeight,
    complaints,
    axis,
  };
}
