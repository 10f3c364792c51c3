import { formatDuration } from '#lib/format/durations';
import { limitMetricText } from '#lib/format/limitMetric';
import { formatPeriod, formatZone } from '#lib/format/times';
import { type Weighting } from '#lib/acoustics/weighting';
import { drawStrip, type StripPicture } from '../draw/drawStrip';
import { type StripGeometry, type Rect } from '../draw/geometry';
import { textWidth, writeText, type Surface } from '../draw/surface';
import { exceedanceMarks, type StripExceedance } from '../model/exceedanceMarks';
import { pxAtSec } from '../model/timeView';
import { type LimitLine } from '../draw/drawLimits';
import { writeTypeset } from './writeTypeset';

/** What is shown, with what it needs to be understood away from its page. */
export interface Sheet {
  picture: StripPicture;
  /** "Ropewalk School (MER-01)". */
  title: string;
  weighting: Weighting;
  /** Length of the columns, s; null where there are none. */
  stepSec: number | null;
  exceedances: readonly StripExceedance[];
}

const HEAD_PX = 54;
const ROW_PX = 18;
const MARGIN_PX = 10;

/** Height of the sheet, CSS pixels. */
export function sheetHeight(sheet: Sheet): number {
  return HEAD_PX + sheet.picture.geometry.height + (1 + limitsShown(sheet).length) * ROW_PX + 2 * MARGIN_PX;
}

/** Draws the strip under its station, period and zone, over its legend and the limits that hold in it. */
export function drawSheet(surface: Surface, sheet: Sheet): void {
  const { picture, title } = sheet;
  const { view, zone } = picture;
  const { palette } = surface;
  const period = { fromSec: Math.floor(view.fromSec), toSec: Math.ceil(view.toSec) };
  const geometry = movedDown(picture.geometry, HEAD_PX, sheetHeight(sheet));
  drawStrip(surface, { ...picture, geometry });
  writeText(surface, title, MARGIN_PX, 18, { colour: palette.ink, sizePx: 16, weight: 700 });
  const words = `${formatPeriod(period, zone)}, times in ${formatZone(zone, period)}`;
  writeText(surface, words, MARGIN_PX, 38, { colour: palette.inkSoft });
  drawMarks(surface, geometry, sheet);
  const legendY = HEAD_PX + picture.geometry.height + MARGIN_PX + ROW_PX / 2;
  drawLegend(surface, sheet, legendY);
  limitsShown(sheet).forEach(({ limit }, row) => {
    const metric = limitMetricText({ ...limit, bandFraction: null, bandIndex: null });
    const text = `Limit “${limit.name}”: ${metric} above ${limit.thresholdDb} dB`;
    writeTypeset(surface, text, MARGIN_PX, legendY + (row + 1) * ROW_PX, palette.inkSoft);
  });
}

function limitsShown({ picture: { limits, view } }: Sheet): LimitLine[] {
  return limits.filter(({ runs }) =>
    runs.some(({ fromSec, toSec }) => fromSec < view.toSec && toSec > view.fromSec),
  );
}

function movedDown(geometry: StripGeometry, byPx: number, height: number): StripGeometry {
  const moved = (rect: Rect): Rect => ({ ...rect, y: rect.y + byPx });
  return {
    ...geometry,
    height,
    spectrogram: moved(geometry.spectrogram),
    marks: moved(geometry.marks),
    trace: moved(geometry.trace),
    lanes: moved(geometry.lanes),
    axis: moved(geometry.axis),
  };
}

/** A triangle at each exceedance; several close together share one with their number. */
function drawMarks({ context, palette, ...rest }: Surface, geometry: StripGeometry, sheet: Sheet): void {
  const { x, y, width, height } = geometry.marks;
  const pxOf = (sec: number) => pxAtSec(sheet.picture.view, width, sec);
  for (const { px, exceedances } of exceedanceMarks(sheet.exceedances, pxOf, width, 25)) {
    const [halfPx, tallPx] = exceedances.length === 1 ? [5.5, 9] : [9, 16];
    const top = y + (height - tallPx) / 2;
    context.fillStyle = palette.rust;
    context.beginPath();
    context.moveTo(x + px - halfPx, top);
    context.lineTo(x + px + halfPx, top);
    context.lineTo(x + px, top + tallPx);
    context.closePath();
    context.fill();
    if (exceedances.length === 1) continue;
    const count = exceedances.length > 9 ? '9+' : String(exceedances.length);
    const style = { colour: palette.paper, align: 'center', sizePx: 9, weight: 700 } as const;
    writeText({ context, palette, ...rest }, count, x + px, top + 5.5, style);
  }
}

const RAMP_PX = 112;
const RAMP_STEPS = 56;
const GAP_PX = 18;

function drawLegend(surface: Surface, { picture, weighting, stepSec }: Sheet, y: number): void {
  const { context, palette } = surface;
  const colour = palette.inkSoft;
  let x = MARGIN_PX;
  const write = (text: string, gapPx: number) => {
    x += writeTypeset(surface, text, x, y, colour) + gapPx;
  };
  if (picture.colouring) {
    const { ramp, range } = picture.colouring;
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
  if (x + textWidth(surface, 'hatched: no data') < picture.geometry.width) write('hatched: no data', 0);
}
