import { formatDuration } from '#lib/format/durations';
import { pxOfLevel, type LevelRange } from '../model/levelAxis';
import { type LimitLine, type StripLimit } from '../model/limitLines';
import { pxAtSec, type TimeView } from '../model/timeView';
import { type StripGeometry } from './geometry';
import { textWidth, within, writeText, type Surface } from './surface';

/** Dashed lines at the thresholds (dotted for maxima) with what they are, where there is room to say it. */
export function drawLimits(
  surface: Surface,
  geometry: StripGeometry,
  view: TimeView,
  range: LevelRange,
  lines: readonly LimitLine[],
): void {
  const { context, palette, ratio } = surface;
  within(surface, geometry.trace, (device) => {
    context.strokeStyle = palette.rust;
    context.lineWidth = 1.3 * ratio;
    for (const { limit, runs } of lines) {
      const y = Math.round(pxOfLevel(range, device.height, limit.thresholdDb)) + 0.5;
      const dash = limit.metric === 'LAeq' ? [5, 3] : [1.5, 3];
      context.setLineDash(dash.map((part) => part * ratio));
      for (const run of runs) {
        context.beginPath();
        context.moveTo(pxAtSec(view, device.width, run.fromSec), y);
        context.lineTo(pxAtSec(view, device.width, run.toSec), y);
        context.stroke();
      }
    }
  });
  labelLimits(surface, geometry, view, range, lines);
}

interface Label {
  x: number;
  y: number;
  width: number;
}

function labelLimits(
  surface: Surface,
  geometry: StripGeometry,
  view: TimeView,
  range: LevelRange,
  lines: readonly LimitLine[],
): void {
  const { x, y, width, height } = geometry.trace;
  const { palette } = surface;
  const placed: Label[] = [];
  for (const { limit, runs } of lines) {
    const name = nameOf(limit);
    const labelWidth = textWidth(surface, name);
    for (const run of runs) {
      if (run.toSec <= view.fromSec || run.fromSec >= view.toSec) continue;
      const from = Math.max(0, pxAtSec(view, width, run.fromSec));
      const roomPx = Math.min(width, pxAtSec(view, width, run.toSec)) - from;
      const label = {
        x: x + from + 4,
        y: y + pxOfLevel(range, height, limit.thresholdDb) - 8,
        width: labelWidth,
      };
      if (roomPx < labelWidth + 8 || label.y < y || placed.some((other) => overlaps(other, label))) continue;
      placed.push(label);
      writeText(surface, name, label.x, label.y, { colour: palette.rust, plate: palette.plate });
    }
  }
}

/** "55 dB, 1 h", "70 dB max, night", "60 dB, 30 min rolling". */
function nameOf({ thresholdDb, metric, averaging, windowMin, stepMin }: StripLimit): string {
  const window = averaging === 'length' ? formatDuration((windowMin ?? 0) * 60) : AVERAGING_WORDS[averaging];
  return `${thresholdDb} dB${metric === 'LAFmax' ? ' max' : ''}, ${window}${stepMin ? ' rolling' : ''}`;
}

const AVERAGING_WORDS = {
  '15min': '15 min',
  '1h': '1 h',
  hours: 'own hours',
  day: 'day',
  evening: 'evening',
  night: 'night',
} as const;

function overlaps(a: Label, b: Label): boolean {
  return Math.abs(a.y - b.y) < 14 && a.x < b.x + b.width + 6 && b.x < a.x + a.width + 6;
}
