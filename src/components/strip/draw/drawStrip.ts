import { type StripComplaint } from '../model/complaintMarks';
import { type Lane } from '../model/lanes';
import { type LevelRange } from '../model/levelAxis';
import { type LimitLine } from '../model/limitLines';
import { type PixelColumns } from '../model/pixelColumns';
import { type Run } from '../model/runs';
import { pxAtSec, type TimeView } from '../model/timeView';
import { drawComplaints } from './drawComplaints';
import { drawGapWords } from './drawGapWords';
import { drawLanes } from './drawLanes';
import { drawLimits } from './drawLimits';
import { drawSpectrogram } from './drawSpectrogram';
import { drawTimeAxis } from './drawTimeAxis';
import { drawTrace } from './drawTrace';
import { type StripGeometry } from './geometry';
import { type Colouring } from './paintSpectrogram';
import { type Surface } from './surface';

/** Everything that the strip's canvas shows. */
export interface StripPicture {
  geometry: StripGeometry;
  view: TimeView;
  zone: string;
  nowSec: number;
  pixels: PixelColumns;
  colouring: Colouring | null;
  traceRange: LevelRange;
  lanes: readonly Lane[];
  /** Stretches with data that do not count. */
  leftOut: readonly Run[];
  limits: readonly LimitLine[];
  complaints: readonly StripComplaint[];
  gapWords: (gap: Run) => string;
}

/** Draws the strip: spectrogram, level trace with limits, validity rows, complaints and the time axis. */
export function drawStrip(surface: Surface, picture: StripPicture): void {
  const { context, ratio } = surface;
  const { geometry, view, pixels, lanes, traceRange } = picture;
  context.setTransform(ratio, 0, 0, ratio, 0, 0);
  const elapsedPx = pxAtSec(view, pixels.widthPx, picture.nowSec);
  drawSpectrogram(surface, geometry, pixels, picture.colouring, elapsedPx);
  drawTrace(surface, geometry, { pixels, view, range: traceRange, leftOut: picture.leftOut, elapsedPx });
  drawTimeAxis(surface, geometry, view, picture.zone);
  drawLimits(surface, geometry, view, traceRange, picture.limits);
  drawGapWords(surface, geometry, view, gapsOf(lanes), picture.gapWords);
  drawLanes(surface, geometry, view, lanes);
  drawComplaints(surface, geometry, view, picture.complaints);
}

/** Stretches that passed without data. */
export function gapsOf(lanes: readonly Lane[]): Run[] {
  return lanes.flatMap(({ runs }) => runs.filter(({ kind }) => kind === 'missing'));
}
