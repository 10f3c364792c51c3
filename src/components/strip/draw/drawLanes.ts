import { type Lane, type LaneKey, type LaneRunKind } from '../model/lanes';
import { type Run } from '../model/runs';
import { pxAtSec, type TimeView } from '../model/timeView';
import { type Rect, type StripGeometry } from './geometry';
import { hatchPattern } from './hatch';
import { within, writeText, type Surface } from './surface';

const BAR_PX = 8;

/** The validity strip: a row each for data and gaps, what is left out, wind, rain, and what came late. */
export function drawLanes(
  surface: Surface,
  geometry: StripGeometry,
  view: TimeView,
  lanes: readonly Lane[],
): void {
  const { x, y, width } = geometry.lanes;
  lanes.forEach((lane, row) => {
    const bar: Rect = { x, y: y + row * geometry.laneHeight, width, height: BAR_PX };
    const middle = bar.y + bar.height / 2;
    writeText(surface, lane.label, x - 8, middle, { colour: surface.palette.inkSoft, align: 'right' });
    within(surface, bar, (device) => {
      surface.context.fillStyle = surface.palette.track;
      surface.context.fillRect(0, 0, device.width, device.height);
      for (const run of lane.runs) drawRun(surface, run.kind, lane.key, boxOf(run, view, device));
    });
  });
}

function boxOf(run: Run, view: TimeView, { width, height }: Rect): Rect {
  const from = Math.max(-4, pxAtSec(view, width, run.fromSec));
  const to = Math.min(width + 4, pxAtSec(view, width, run.toSec));
  return { x: from, y: 0, width: Math.max(1.5, to - from), height };
}

function drawRun(surface: Surface, kind: LaneRunKind, lane: LaneKey, box: Rect): void {
  const { context, palette, ratio } = surface;
  if (kind === 'missing') return outlineRun(surface, box);
  context.fillStyle = lane === 'data' ? palette.reed : lane === 'late' ? palette.estuary : palette.ochre;
  // What is only noted counts like any other data: half the height, so that it does not look like a fault.
  const top = kind === 'noted' ? box.height / 2 : 0;
  context.fillRect(box.x, top, box.width, box.height - top);
  if (lane !== 'left-out') return;
  context.fillStyle = palette.paper;
  for (let x = box.x + 4 * ratio; x < box.x + box.width - ratio; x += 5 * ratio) {
    context.fillRect(x, 0, ratio, box.height);
  }
}

function outlineRun(surface: Surface, box: Rect): void {
  const { context, palette, ratio } = surface;
  context.fillStyle = palette.paper;
  context.fillRect(box.x, box.y, box.width, box.height);
  context.fillStyle = hatchPattern(surface);
  context.fillRect(box.x, box.y, box.width, box.height);
  context.strokeStyle = palette.ochre;
  context.lineWidth = ratio;
  context.strokeRect(box.x + ratio / 2, ratio / 2, Math.max(ratio, box.width - ratio), box.height - ratio);
}
