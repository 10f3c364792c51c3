import type { HourCell, HourRow } from '#lib/contracts/figureSheet';
import { round, type ChartRange } from './chartScale';

/** Classes of level that cells are drawn in. */
export const CLASSES = 20;

/** Sizes of the drawing in its own units; rows are the lower the more there are. */
export const HEAT_MAP = { left: 92, width: 720, top: 20 } as const;

/** What is drawn, as SVG path data. */
export interface HeatMapPaths {
  /** Cells of each level class, quiet to loud, with the class's middle level. */
  classes: { levelDb: number; path: string }[];
  /** Hours without valid data. */
  gaps: string;
  /** Hours with a level but less than the minimum coverage. */
  thin: string;
  /** Hours that the spring change leaves out. */
  skipped: string;
}

/** Height of a row. */
export function rowHeight(rows: number): number {
  if (rows <= 31) return 18;
  return rows <= 100 ? 8 : 3;
}

/** Left edge and width of a cell: the two hours of an autumn change share the place of one. */
export function cellSpan({ hour, turn }: Pick<HourCell, 'hour' | 'turn'>, isTwice: boolean) {
  const width = (HEAT_MAP.width - HEAT_MAP.left) / 24;
  const part = isTwice ? width / 2 : width;
  return { x: HEAT_MAP.left + hour * width + turn * part, width: part };
}

/** Paths of the heat map. */
export function heatMapPaths(rows: readonly HourRow[], range: ChartRange): HeatMapPaths {
  const height = rowHeight(rows.length);
  const cells: LevelCell[] = [];
  let [thin, skipped] = ['', ''];
  rows.forEach((row, at) => {
    const y = HEAT_MAP.top + at * height;
    const twice = new Set(row.cells.filter(({ turn }) => turn === 1).map(({ hour }) => hour));
    for (const cell of row.cells) {
      const { x, width } = cellSpan(cell, twice.has(cell.hour));
      const path = rectangle(x, y, width, height);
      cells.push({ levelDb: cell.LAeq, path });
      if (cell.LAeq !== null && !cell.meetsMinimum) thin += path;
    }
    for (const hour of row.skippedHours) {
      const { x, width } = cellSpan({ hour, turn: 0 }, false);
      skipped += `M${round(x + width / 2 - 3)} ${round(y + height / 2)}h6`;
    }
  });
  return { ...classPaths(cells, range), thin, skipped };
}

/** A cell and its level; null has none. */
export interface LevelCell {
  levelDb: number | null;
  path: string;
}

/** The paths of cells by their class of level, and of those that have none. */
export function classPaths(
  cells: readonly LevelCell[],
  { lowDb, highDb }: ChartRange,
): Pick<HeatMapPaths, 'classes' | 'gaps'> {
  const classDb = (highDb - lowDb) / CLASSES;
  const classes = Array.from({ length: CLASSES }, (_, at) => ({
    levelDb: lowDb + (at + 0.5) * classDb,
    path: '',
  }));
  let gaps = '';
  for (const { levelDb, path } of cells) {
    const held = levelDb === null ? undefined : classes[classOf(levelDb, lowDb, classDb)];
    if (held) held.path += path;
    else gaps += path;
  }
  return { classes: classes.filter(({ path }) => path !== ''), gaps };
}

function classOf(levelDb: number, lowDb: number, classDb: number): number {
  return Math.min(CLASSES - 1, Math.max(0, Math.floor((levelDb - lowDb) / classDb)));
}

/** A rectangle as SVG path data. */
export function rectangle(x: number, y: number, width: number, height: number): string {
  return `M${round(x)} ${round(y)}h${round(width)}v${round(height)}h${round(-width)}z`;
}
