import type { Point } from './plane';
import { isInside, ringAreaM2 } from './shapes';

/** Heights at the crossings of east and north grid lines, which need not be evenly spaced. */
export interface Grid {
  eastM: number[];
  northM: number[];
  /** Row by row from the south: index = row · columns + column. */
  value: Float64Array;
}

/** Sides of a cell: south, east, north, west. For each of the 16 patterns of corners above the level, pairs of sides that a line joins. */
const JOINS: readonly (readonly (readonly [number, number])[])[] = [
  [],
  [[0, 3]],
  [[1, 0]],
  [[1, 3]],
  [[2, 1]],
  [
    [2, 3],
    [0, 1],
  ],
  [[2, 0]],
  [[2, 3]],
  [[3, 2]],
  [[0, 2]],
  [
    [3, 0],
    [1, 2],
  ],
  [[1, 2]],
  [[3, 1]],
  [[0, 1]],
  [[3, 0]],
  [],
];

/**
 * Lines along which a grid passes a level (marching squares), the higher side to the left.
 * Lines that end at the grid's edge stay open; the others repeat their first point.
 */
export function isolines(grid: Grid, level: number): Point[][] {
  const columns = grid.eastM.length;
  const valueAt = (column: number, row: number) => grid.value[row * columns + column] ?? 0;
  const onSide = (column: number, row: number, side: number): { key: number; point: Point } => {
    const isLevel = side === 0 || side === 2;
    const [c, r] = [column + (side === 1 ? 1 : 0), row + (side === 2 ? 1 : 0)];
    const [c2, r2] = isLevel ? [c + 1, r] : [c, r + 1];
    const [low, high] = [valueAt(c, r), valueAt(c2, r2)];
    const share = (level - low) / (high - low);
    const mix = (line: number[], from: number, to: number) =>
      (line[from] ?? 0) + ((line[to] ?? 0) - (line[from] ?? 0)) * share;
    return {
      key: (r * columns + c) * 2 + (isLevel ? 0 : 1),
      point: [mix(grid.eastM, c, c2), mix(grid.northM, r, r2)],
    };
  };

  const points = new Map<number, Point>();
  const next = new Map<number, number>();
  const hasBefore = new Set<number>();
  for (let row = 0; row < grid.northM.length - 1; row += 1) {
    for (let column = 0; column < columns - 1; column += 1) {
      const pattern =
        (valueAt(column, row) >= level ? 1 : 0) |
        (valueAt(column + 1, row) >= level ? 2 : 0) |
        (valueAt(column + 1, row + 1) >= level ? 4 : 0) |
        (valueAt(column, row + 1) >= level ? 8 : 0);
      for (const [fromSide, toSide] of JOINS[pattern] ?? []) {
        const from = onSide(column, row, fromSide);
        const to = onSide(column, row, toSide);
        points.set(from.key, from.point).set(to.key, to.point);
        next.set(from.key, to.key);
        hasBefore.add(to.key);
      }
    }
  }
  return chains(points, next, hasBefore);
}

function chains(points: Map<number, Point>, next: Map<number, number>, hasBefore: Set<number>): Point[][] {
  const lines: Point[][] = [];
  const follow = (start: number) => {
    const lineOfPoints: Point[] = [];
    let key: number | undefined = start;
    while (key !== undefined) {
      const point = points.get(key);
      if (point) lineOfPoints.push(point);
      const following: number | undefined = next.get(key);
      next.delete(key);
      key = following;
    }
    lines.push(lineOfPoints);
  };
  for (const key of [...next.keys()]) if (!hasBefore.has(key)) follow(key);
  for (const key of [...next.keys()]) if (next.has(key)) follow(key);
  return lines;
}

/** A copy of a grid whose outermost values are `value`, so that every isoline closes. */
function walled(grid: Grid, value: number): Grid {
  const columns = grid.eastM.length;
  const rows = grid.northM.length;
  const copy = grid.value.slice();
  for (let column = 0; column < columns; column += 1) {
    copy[column] = value;
    copy[(rows - 1) * columns + column] = value;
  }
  for (let row = 0; row < rows; row += 1) {
    copy[row * columns] = value;
    copy[row * columns + columns - 1] = value;
  }
  return { ...grid, value: copy };
}

/**
 * The areas of a grid at or above a level, each an outer ring followed by its holes.
 * Outer rings run counter-clockwise, because the higher side is on the left of an isoline.
 */
export function areasAbove(grid: Grid, level: number): Point[][][] {
  const rings = isolines(walled(grid, -1e9), level)
    .map((ring) => ring.slice(0, -1))
    .filter((ring) => ring.length >= 3)
    .map((ring) => ({ ring, areaM2: ringAreaM2(ring) }));
  const outers = rings
    .filter(({ areaM2 }) => areaM2 > 0)
    .sort((a, b) => a.areaM2 - b.areaM2)
    .map(({ ring }) => [ring]);
  for (const { ring, areaM2 } of rings) {
    const first = ring[0];
    if (areaM2 >= 0 || !first) continue;
    outers.find(([outer]) => outer !== undefined && isInside(first, outer))?.push(ring);
  }
  return outers;
}
