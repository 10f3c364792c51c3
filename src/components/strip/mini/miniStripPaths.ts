import type { WindowStrip } from '#lib/contracts/windowStrip';

/** Sizes of the drawing in its own units. */
export const MINI_STRIP = {
  left: 46,
  width: 720,
  spectrogramTop: 18,
  spectrogramHeight: 132,
  traceTop: 160,
  traceHeight: 84,
} as const;

const CLASSES = 16;

/** Shortest span of the colours, so that a quiet night does not borrow the ink of a loud one. */
const SHORTEST_RAMP_DB = 50;
const SHORTEST_TRACE_DB = 15;

/** A level range of whole fives that holds every level of the drawing. */
export interface LevelRange {
  lowDb: number;
  highDb: number;
}

/** What is drawn, as SVG path data. */
export interface MiniStripPaths {
  bandRange: LevelRange;
  /** Cells of each level class, quiet to loud, with the class's middle level. */
  cells: { levelDb: number; path: string }[];
  traceRange: LevelRange;
  trace: string;
  /** Steps that were measured but do not count. */
  excluded: string;
  /** Steps without anything. */
  gaps: string;
}

/** Paths of the strip; null where nothing at all was measured. */
export function miniStripPaths(strip: WindowStrip): MiniStripPaths | null {
  const levels = strip.laeqDb.filter((level) => level !== null);
  if (levels.length === 0) return null;
  const bandRange = rangeOf(
    strip.bandLevelsDb.flat().filter((level) => level !== null),
    SHORTEST_RAMP_DB,
  );
  const traceRange = rangeOf(levels, SHORTEST_TRACE_DB);
  return {
    bandRange,
    cells: cellPaths(strip, bandRange),
    traceRange,
    trace: tracePath(strip, traceRange),
    excluded: stepPath(strip, (step) => strip.laeqDb[step] !== null && strip.isValid[step] === false),
    gaps: stepPath(strip, (step) => strip.laeqDb[step] === null),
  };
}

/** Where an instant lies from left to right. */
export function xOf(strip: WindowStrip, sec: number): number {
  return MINI_STRIP.left + ((sec - strip.fromSec) / strip.stepSec) * stepWidth(strip);
}

/** Where a level lies in the trace. */
export function traceY({ lowDb, highDb }: LevelRange, levelDb: number): number {
  return MINI_STRIP.traceTop + (1 - (levelDb - lowDb) / (highDb - lowDb)) * MINI_STRIP.traceHeight;
}

/** Where a band's middle lies in the spectrogram, bands upward. */
export function bandY(strip: WindowStrip, band: number): number {
  const height = MINI_STRIP.spectrogramHeight / Math.max(1, strip.bandsHz.length);
  return MINI_STRIP.spectrogramTop + MINI_STRIP.spectrogramHeight - (band + 0.5) * height;
}

function stepWidth(strip: WindowStrip): number {
  return (MINI_STRIP.width - MINI_STRIP.left) / strip.laeqDb.length;
}

function rangeOf(levels: readonly number[], shortestDb: number): LevelRange {
  if (levels.length === 0) return { lowDb: 0, highDb: shortestDb };
  const [low, high] = levels.reduce(
    ([a, b], level) => [Math.min(a, level), Math.max(b, level)],
    [Infinity, -Infinity],
  );
  const lowDb = Math.floor(low / 5) * 5;
  return { lowDb, highDb: Math.max(lowDb + shortestDb, Math.ceil(high / 5) * 5) };
}

function cellPaths(strip: WindowStrip, { lowDb, highDb }: LevelRange): { levelDb: number; path: string }[] {
  const classDb = (highDb - lowDb) / CLASSES;
  const paths = Array.from({ length: CLASSES }, () => '');
  const height = MINI_STRIP.spectrogramHeight / Math.max(1, strip.bandsHz.length);
  const width = stepWidth(strip);
  strip.bandLevelsDb.forEach((bands, step) => {
    const x = MINI_STRIP.left + step * width;
    bands.forEach((level, band) => {
      if (level === null) return;
      const at = Math.min(CLASSES - 1, Math.max(0, Math.floor((level - lowDb) / classDb)));
      paths[at] += rectangle(x, bandY(strip, band) - height / 2, width, height);
    });
  });
  return paths
    .map((path, at) => ({ levelDb: lowDb + (at + 0.5) * classDb, path }))
    .filter(({ path }) => path !== '');
}

function tracePath(strip: WindowStrip, range: LevelRange): string {
  const width = stepWidth(strip);
  let path = '';
  strip.laeqDb.forEach((level, step) => {
    if (level === null) return;
    const x = MINI_STRIP.left + step * width;
    const y = n(traceY(range, level));
    const follows = step > 0 && strip.laeqDb[step - 1] !== null;
    path += `${follows ? 'L' : 'M'}${n(x)} ${y}H${n(x + width)}`;
  });
  return path;
}

function stepPath(strip: WindowStrip, holds: (step: number) => boolean): string {
  const width = stepWidth(strip);
  let path = '';
  for (let step = 0; step < strip.laeqDb.length; step += 1) {
    if (!holds(step)) continue;
    let end = step + 1;
    while (end < strip.laeqDb.length && holds(end)) end += 1;
    const height = MINI_STRIP.traceTop + MINI_STRIP.traceHeight - MINI_STRIP.spectrogramTop;
    path += rectangle(
      MINI_STRIP.left + step * width,
      MINI_STRIP.spectrogramTop,
      (end - step) * width,
      height,
    );
    step = end;
  }
  return path;
}

function rectangle(x: number, y: number, width: number, height: number): string {
  return `M${n(x)} ${n(y)}h${n(width)}v${n(height)}h${n(-width)}z`;
}

function n(value: number): string {
  return String(Math.round(value * 100) / 100);
}
