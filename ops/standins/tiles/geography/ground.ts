import { segmentsOf } from './curves';
import { DISTRICT, maskOver } from './mask';
import type { Point } from './plane';
import { distanceToSegmentM, isInside } from './shapes';
import { islands, mainland } from './shore';

/** Whether a point of the mapped district is land, to the nearest 20 m. */
export const isLand = maskOver(DISTRICT, 20, [[mainland, ...islands]]);

const CELL_M = 40;
const cellKey = (x: number, y: number) => `${Math.floor(x / CELL_M)},${Math.floor(y / CELL_M)}`;

interface Strip {
  a: Point;
  b: Point;
  halfWidthM: number;
}

interface Extent {
  west: number;
  east: number;
  south: number;
  north: number;
}

const isWithin = ([x, y]: Point, { west, east, south, north }: Extent) =>
  x >= west && x <= east && y >= south && y <= north;

function extentOf(ring: readonly Point[]): Extent {
  const xs = ring.map(([x]) => x);
  const ys = ring.map(([, y]) => y);
  return { west: Math.min(...xs), east: Math.max(...xs), south: Math.min(...ys), north: Math.max(...ys) };
}

/** Whether two convex rings overlap: no side of either separates them. */
function doOverlap(one: readonly Point[], other: readonly Point[]): boolean {
  for (const ring of [one, other]) {
    for (const [a, b] of segmentsOf([...ring, ring[0] ?? [0, 0]])) {
      const normal: Point = [b[1] - a[1], a[0] - b[0]];
      const reach = (points: readonly Point[]) => points.map(([x, y]) => x * normal[0] + y * normal[1]);
      const [reachOne, reachOther] = [reach(one), reach(other)];
      const slack = 0.05 * Math.hypot(...normal);
      if (Math.max(...reachOne) <= Math.min(...reachOther) + slack) return false;
      if (Math.max(...reachOther) <= Math.min(...reachOne) + slack) return false;
    }
  }
  return true;
}

/** Where building is still possible: keeps clear of water, ways, reserved areas, and what stands already. */
export class BuildingGround {
  private readonly strips = new Map<string, Strip[]>();
  private readonly standing = new Map<string, Point[][]>();

  private readonly reserved: { ring: readonly Point[]; extent: Extent }[];

  constructor(reserved: readonly (readonly Point[])[]) {
    this.reserved = reserved.map((ring) => ({ ring, extent: extentOf(ring) }));
  }

  /** Keeps a way clear for `widthM` about its middle. */
  addWay(points: readonly Point[], widthM: number): void {
    for (const [a, b] of segmentsOf(points)) {
      const strip = { a, b, halfWidthM: widthM / 2 };
      this.cellsOf([a, b], widthM).forEach((key) => {
        this.strips.set(key, [...(this.strips.get(key) ?? []), strip]);
      });
    }
  }

  /** Whether a convex footprint may stand; if so it does from now on. */
  claim(footprint: readonly Point[]): boolean {
    const cells = this.cellsOf(footprint, 0);
    if (!footprint.every(isLand) || this.isReserved(footprint)) return false;
    if (cells.some((key) => this.strips.get(key)?.some((strip) => this.isOnStrip(footprint, strip))))
      return false;
    if (cells.some((key) => this.standing.get(key)?.some((ring) => doOverlap(ring, footprint)))) return false;
    cells.forEach((key) => this.standing.set(key, [...(this.standing.get(key) ?? []), [...footprint]]));
    return true;
  }

  private isReserved(footprint: readonly Point[]): boolean {
    return this.reserved.some(({ ring, extent }) =>
      footprint.some((point) => isWithin(point, extent) && isInside(point, ring)),
    );
  }

  private isOnStrip(footprint: readonly Point[], { a, b, halfWidthM }: Strip): boolean {
    const isCornerOn = footprint.some((point) => distanceToSegmentM(point, a, b) < halfWidthM - 0.3);
    return isCornerOn || isInside(a, footprint) || isInside(b, footprint);
  }

  private cellsOf(points: readonly Point[], marginM: number): string[] {
    const { west, east, south, north } = extentOf(points);
    const keys: string[] = [];
    for (let x = west - marginM; x < east + marginM + CELL_M; x += CELL_M) {
      for (let y = south - marginM; y < north + marginM + CELL_M; y += CELL_M) keys.push(cellKey(x, y));
    }
    return keys;
  }
}
