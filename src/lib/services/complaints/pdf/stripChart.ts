import { bandByNominalHz, bandLabel } from '#lib/acoustics/bands';
import type { WindowStrip } from '#lib/contracts/windowStrip';
import { levelRampRgb, RAMP_STEPS } from '#lib/format/levelRamp';
import { formatClock } from '#lib/format/times';
import { INK, RULE } from '../../summaries/pdf/typography';
import { label, line, n, svg } from './svg';

const WIDTH = 470;
const LEFT = 30;
const BANDS_TOP = 14;
const BANDS_FOOT = 114;
const TRACE_TOP = 122;
const TRACE_FOOT = 192;
const HEIGHT = 208;
const CLASSES = 14;
const SHORTEST_RANGE_DB = 40;
const SHORTEST_TRACE_DB = 15;
const LABELLED_HZ = [31.5, 125, 500, 2000, 8000];
const MARK_STEPS_SEC = [600, 900, 1800, 3600, 7200, 14_400, 21_600, 43_200, 86_400];
const MOST_MARKS = 8;
const BLUE = '#2f5d86';

interface Range {
  lowDb: number;
  highDb: number;
}

/** The strip in vectors: bands upward in the level ramp, the level below, lines around the window. Null where nothing was measured. */
export function stripChartSvg(strip: WindowStrip, zone: string): string | null {
  const levels = strip.laeqDb.filter((level) => level !== null);
  if (levels.length === 0) return null;
  const range = rangeOf(levels, SHORTEST_TRACE_DB);
  const x = (sec: number) =>
    LEFT + ((sec - strip.fromSec) / (strip.stepSec * strip.laeqDb.length)) * (WIDTH - LEFT);
  const y = (db: number) =>
    TRACE_FOOT - ((db - range.lowDb) / (range.highDb - range.lowDb)) * (TRACE_FOOT - TRACE_TOP);
  const from = x(strip.windowFromSec);
  const to = x(strip.windowToSec);
  const span = `${formatClock(strip.windowFromSec, zone)} to ${formatClock(strip.windowToSec, zone)}`;
  return svg(WIDTH, HEIGHT, [
    ...gaps(strip),
    ...cells(strip),
    ...bandLabels(strip),
    ...[range.lowDb, range.highDb].flatMap((db) => [
      line(LEFT, y(db), WIDTH, y(db), RULE, 0.4),
      label(LEFT - 5, y(db) + 2.5, String(db), 'end'),
    ]),
    label(LEFT - 5, (TRACE_TOP + TRACE_FOOT) / 2 + 2, 'dB(A)', 'end'),
    ...trace(strip, y),
    ...[from, to].map((at) => line(at, BANDS_TOP - 4, at, TRACE_FOOT, BLUE, 1)),
    label((from + to) / 2, BANDS_TOP - 6, span, 'middle', BLUE),
    ...clockMarks(strip).map((sec) => label(x(sec), TRACE_FOOT + 12, formatClock(sec, zone), 'middle')),
  ]);
}

function rangeOf(levels: readonly number[], shortestDb: number): Range {
  const [low, high] = levels.reduce(
    ([a, b], level) => [Math.min(a, level), Math.max(b, level)],
    [Infinity, -Infinity],
  );
  const lowDb = Math.floor(low / 5) * 5;
  return { lowDb, highDb: Math.max(lowDb + shortestDb, Math.ceil(high / 5) * 5) };
}

/** Cells of one class in a row of the drawing are one rectangle, and all of a class one path: a page holds few objects. */
function cells(strip: WindowStrip): string[] {
  const levels = strip.bandLevelsDb.flat().filter((level) => level !== null);
  if (levels.length === 0) return [];
  const { lowDb, highDb } = rangeOf(levels, SHORTEST_RANGE_DB);
  const classOf = (level: number | null | undefined) =>
    level === null || level === undefined
      ? -1
      : Math.min(CLASSES - 1, Math.max(0, Math.floor(((level - lowDb) / (highDb - lowDb)) * CLASSES)));
  const paths = Array.from({ length: CLASSES }, () => '');
  const height = (BANDS_FOOT - BANDS_TOP) / strip.bandsHz.length;
  const width = (WIDTH - LEFT) / strip.laeqDb.length;
  strip.bandsHz.forEach((_, band) => {
    const top = BANDS_FOOT - (band + 1) * height;
    for (let step = 0, end = 0; step < strip.bandLevelsDb.length; step = end) {
      const found = classOf(strip.bandLevelsDb[step]?.[band]);
      end = step + 1;
      while (end < strip.bandLevelsDb.length && classOf(strip.bandLevelsDb[end]?.[band]) === found) end += 1;
      if (found < 0) continue;
      paths[found] +=
        `M${n(LEFT + step * width)} ${n(top)}h${n((end - step) * width)}v${n(height)}h${n((step - end) * width)}z`;
    }
  });
  return paths.flatMap((path, at) => (path === '' ? [] : [`<path d="${path}" fill="${colourOf(at)}"/>`]));
}

function colourOf(levelClass: number): string {
  const step = Math.round(((levelClass + 0.5) / CLASSES) * (RAMP_STEPS - 1));
  const bytes = [...levelRampRgb('light').subarray(step * 4, step * 4 + 3)];
  return `#${bytes.map((byte) => byte.toString(16).padStart(2, '0')).join('')}`;
}

/** Hatched where nothing was measured. */
function gaps(strip: WindowStrip): string[] {
  const width = (WIDTH - LEFT) / strip.laeqDb.length;
  const strokes: string[] = [];
  strip.laeqDb.forEach((level, step) => {
    if (level !== null) return;
    const x = LEFT + step * width;
    for (let top = BANDS_TOP; top < TRACE_FOOT; top += 6) {
      strokes.push(`M${n(x)} ${n(top + 4)}L${n(x + width)} ${n(top)}`);
    }
  });
  return strokes.length === 0
    ? []
    : [`<path d="${strokes.join('')}" stroke="${RULE}" stroke-width="0.5" fill="none"/>`];
}

/** Counted steps in ink, those that do not count in grey. */
function trace(strip: WindowStrip, y: (db: number) => number): string[] {
  const width = (WIDTH - LEFT) / strip.laeqDb.length;
  const paths = { counted: '', other: '' };
  strip.laeqDb.forEach((level, step) => {
    if (level === null) return;
    const kind = strip.isValid[step] ? 'counted' : 'other';
    const isJoined =
      step > 0 && strip.laeqDb[step - 1] !== null && strip.isValid[step - 1] === strip.isValid[step];
    const x = LEFT + step * width;
    paths[kind] += `${isJoined ? 'L' : 'M'}${n(x)} ${n(y(level))}H${n(x + width)}`;
  });
  return [
    ...(paths.other === ''
      ? []
      : [`<path d="${paths.other}" stroke="${RULE}" stroke-width="0.9" fill="none"/>`]),
    ...(paths.counted === ''
      ? []
      : [`<path d="${paths.counted}" stroke="${INK}" stroke-width="0.9" fill="none"/>`]),
  ];
}

function bandLabels(strip: WindowStrip): string[] {
  const height = (BANDS_FOOT - BANDS_TOP) / strip.bandsHz.length;
  return strip.bandsHz.flatMap((hz, at) => {
    const band = bandByNominalHz(3, hz);
    if (!band || !LABELLED_HZ.includes(hz)) return [];
    const text = bandLabel(band).replace(' Hz', '').replace(' kHz', 'k');
    return [label(LEFT - 5, BANDS_FOOT - (at + 0.5) * height + 2.5, text, 'end')];
  });
}

/** Round times by the UTC clock, which quarter-hours of every zone share; the last of them keeps clear of the edge. */
function clockMarks({ fromSec, stepSec, laeqDb }: WindowStrip): number[] {
  const lengthSec = stepSec * laeqDb.length;
  const every = MARK_STEPS_SEC.find((step) => lengthSec / step <= MOST_MARKS) ?? 86_400;
  const first = Math.ceil(fromSec / every) * every;
  const count = Math.max(0, Math.ceil((fromSec + lengthSec * 0.98 - first) / every));
  return Array.from({ length: count }, (_, at) => first + at * every);
}
