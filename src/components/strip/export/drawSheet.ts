import { formatDuration } from '#lib/format/durations';
import { limitMetricText } from '#lib/format/limitMetric';
import { formatPeriod, formatZone } from '#lib/format/times';
import { type Weighting } from '#lib/acoustics/weighting';
import { drawSelection } from '../draw/drawSelection';
import { drawStrip, type StripPicture } from '../draw/drawStrip';
import { type StripGeometry, type Rect } from '../draw/geometry';
import { textWidth, writeText, type Surface } from '../draw/surface';
import { complaintMarkWords } from '../model/complaintMarks';
import { exceedanceMarks, type StripExceedance } from '../model/exceedanceMarks';
import { pxAtSec } from '../model/timeView';
import { bandRangeWords } from '../model/bandWords';
import { type Selection } from '../model/selection';
import { stretchWords } from '../model/timeWords';
import { writeTypeset } from './writeTypeset';

/** One strip of the sheet. */
export interface SheetPart {
  picture: StripPicture;
  /** "Ropewalk School (MER-01)". */
  title: string;
  exceedances: readonly StripExceedance[];
  selection: Selection | null;
}

/** What is shown, with what it needs to be understood away from its page. */
export interface Sheet {
  /** From the top down, all of one width. */
  parts: readonly SheetPart[];
  weighting: Weighting;
  /** Length of the columns, s; null where there are none. */
  stepSec: number | null;
  /** Length of time that exceedance levels are of, s; null where there are none. */
  blockSec: number | null;
}

const HEAD_PX = 54;
const ROW_PX = 18;
const MARGIN_PX = 10;
const MOST_COMPLAINT_LINES = 5;

/** Width and height of the sheet, CSS pixels. */
export function sheetSize(sheet: Sheet): { width: number; height: number } {
  const rows = 1 + sheet.parts.reduce((sum, part) => sum + footLines(part).length, 0);
  return {
    width: Math.max(...sheet.parts.map(({ picture }) => picture.geometry.width)),
    height: partsHeight(sheet.parts) + rows * ROW_PX + 2 * MARGIN_PX,
  };
}

/** Draws the strips, each under its station, period and zone, over their legend, the limits that hold in them, and what is marked. */
export function drawSheet(surface: Surface, sheet: Sheet): void {
  sheet.parts.forEach((part, at) => drawPart(surface, part, partsHeight(sheet.parts.slice(0, at))));
  const legendY = partsHeight(sheet.parts) + MARGIN_PX + ROW_PX / 2;
  drawLegend(surface, sheet, legendY);
  const lines = sheet.parts.flatMap((part) =>
    footLines(part).map((line) => (sheet.parts.length > 1 ? `${part.title}: ${line}` : line)),
  );
  lines.forEach((text, row) => {
    writeTypeset(surface, text, MARGIN_PX, legendY + (row + 1) * ROW_PX, surface.palette.inkSoft);
  });
}

function partsHeight(parts: readonly SheetPart[]): number {
  return parts.reduce((sum, { picture }) => sum + HEAD_PX + picture.geometry.height, 0);
}

function drawPart(
  surface: Surface,
  { picture, title, exceedances, selection }: SheetPart,
  topPx: number,
): void {
  const { view, zone } = picture;
  const { palette } = surface;
  const period = { fromSec: Math.floor(view.fromSec), toSec: Math.ceil(view.toSec) };
  const moved = { ...picture, geometry: movedDown(picture.geometry, topPx + HEAD_PX) };
  drawStrip(surface, moved);
  writeText(surface, title, MARGIN_PX, topPx + 18, { colour: palette.ink, sizePx: 16, weight: 700 });
  const words = `${formatPeriod(period, zone)}, times in ${formatZone(zone, period)}`;
  writeText(surface, words, MARGIN_PX, topPx + 38, { colour: palette.inkSoft });
  drawMarks(surface, moved, exceedances);
  if (selection) drawSelection(surface, moved, selection);
}

/** What is told below the legend of one strip: its limits, complaints, and what is marked on it. */
function footLines({ picture, selection }: SheetPart): string[] {
  const { view, zone } = picture;
  const limits = picture.limits
    .filter(({ runs }) => runs.some(({ fromSec, toSec }) => fromSec < view.toSec && toSec > view.fromSec))
    .map(({ limit }) => {
      const metric = limitMetricText({ ...limit, bandFraction: null, bandIndex: null });
      return `Limit “${limit.name}”: ${metric} above ${limit.thresholdDb} dB`;
    });
  const complaints = picture.complaints
    .filter(({ fromSec, toSec }) => fromSec < view.toSec && toSec > view.fromSec)
    .map((complaint) => complaintMarkWords([complaint], zone));
  const heard = complaints.slice(0, MOST_COMPLAINT_LINES);
  const more = complaints.length - heard.length;
  if (more > 0) heard.push(`and ${more} more ${more === 1 ? 'complaint' : 'complaints'}`);
  const told = [...limits, ...heard];
  const bands = selection?.bands ? `, ${bandRangeWords(selection.bands)}` : '';
  return selection ? [...told, `Marked: ${stretchWords(selection, zone)}${bands}`] : told;
}

function movedDown(geometry: StripGeometry, byPx: number): StripGeometry {
  const moved = (rect: Rect): Rect => ({ ...rect, y: rect.y + byPx });
  return {
    ...geometry,
    spectrogram: moved(geometry.spectrogram),
    marks: moved(geometry.marks),
    trace: moved(geometry.trace),
    lanes: moved(geometry.lanes),
    complaints: moved(geometry.complaints),
    axis: moved(geometry.axis),
  };
}

/** A triangle at each exceedance; several close together share one with their number. */
function drawMarks(
  { context, palette, ...rest }: Surface,
  { view, geometry }: StripPicture,
  all: readonly StripExceedance[],
): void {
  const { x, y, width, height } = geometry.marks;
  for (const { px, held } of exceedanceMarks(all, (sec) => pxAtSec(view, width, sec), width, 25)) {
    const [halfPx, tallPx] = held.length === 1 ? [5.5, 9] : [9, 16];
    const top = y + (height - tallPx) / 2;
    context.fillStyle = palette.rust;
    context.beginPath();
    context.moveTo(x + px - halfPx, top);
    context.lineTo(x + px + halfPx, top);
    context.lineTo(x + px, top + tallPx);
    context.closePath();
    context.fill();
    if (held.length === 1) continue;
    const count = held.length > 9 ? '9+' : String(held.length);
    const style = { colour: palette.paper, align: 'center', sizePx: 9, weight: 700 } as const;
    writeText({ context, palette, ...rest }, count, x + px, top + 5.5, style);
  }
}

const RAMP_PX = 112;
const RAMP_STEPS = 56;
const GAP_PX = 18;

function drawLegend(surface: Surface, sheet: Sheet, y: number): void {
  const { weighting, stepSec, blockSec } = sheet;
  const colouring = sheet.parts.find(({ picture }) => picture.colouring)?.picture.colouring;
  const { context, palette } = surface;
  const colour = palette.inkSoft;
  let x = MARGIN_PX;
  const write = (text: string, gapPx: number) => {
    x += writeTypeset(surface, text, x, y, colour) + gapPx;
  };
  if (colouring) {
    const { ramp, range } = colouring;
    write(String(range.lowDb), 6);
    for (let step = 0; step < RAMP_STEPS; step += 1) {
      const at = Math.round((step * 255) / (RAMP_STEPS - 1)) * 4;
      context.fillStyle = `rgb(${ramp[at]}, ${ramp[at + 1]}, ${ramp[at + 2]})`;
      context.fillRect(x + (step * RAMP_PX) / RAMP_STEPS, y - 5, RAMP_PX / RAMP_STEPS, 10);
    }
    x += RAMP_PX + 6;
    write(`${range.highDb} dB (${weighting}) a band`, GAP_PX);
  }
  context.fillStyle = palette.ink;
  context.fillRect(x, y - 1, 16, 2);
  x += 22;
  write(stepSec === null ? 'LAeq' : `LAeq,${formatDuration(stepSec)}`, GAP_PX);
  context.fillStyle = palette.envelope;
  context.fillRect(x, y - 5, 16, 10);
  x += 22;
  write('up to LAFmax', GAP_PX);
  if (blockSec !== null) {
    context.fillStyle = palette.percentiles;
    context.fillRect(x, y - 5, 16, 10);
    context.fillStyle = palette.reed;
    context.fillRect(x, y - 0.75, 16, 1.5);
    x += 22;
    write(`LA90,${formatDuration(blockSec)} to LA10, line LA50`, GAP_PX);
  }
  if (x + textWidth(surface, 'hatched: no data') < sheetSize(sheet).width) write('hatched: no data', 0);
}
