import { type StripComplaint } from '../model/complaintMarks';
import { pxAtSec, type TimeView } from '../model/timeView';
import { type Rect, type StripGeometry } from './geometry';
import { within, writeText, type Surface } from './surface';

const BAR_PX = 8;

/** The row of complaints: a bar over each stretch of time in which somebody heard something. */
export function drawComplaints(
  surface: Surface,
  { complaints: row }: StripGeometry,
  view: TimeView,
  complaints: readonly StripComplaint[],
): void {
  const { palette } = surface;
  const bar: Rect = { ...row, y: row.y + (row.height - BAR_PX) / 2, height: BAR_PX };
  const style = { colour: palette.inkSoft, align: 'right' } as const;
  writeText(surface, 'heard', row.x - 8, row.y + row.height / 2, style);
  within(surface, bar, ({ width, height }) => {
    surface.context.fillStyle = palette.track;
    surface.context.fillRect(0, 0, width, height);
    surface.context.fillStyle = palette.estuary;
    for (const { fromSec, toSec } of complaints) {
      const from = Math.max(0, pxAtSec(view, width, fromSec));
      const to = Math.min(width, pxAtSec(view, width, toSec));
      if (from < width && to > 0) surface.context.fillRect(from, 0, Math.max(1.5, to - from), height);
    }
  });
}
