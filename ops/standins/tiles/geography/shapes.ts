import { distanceM, segmentsOf, smoothRing, wander } from './curves';
import type { Point } from './plane';

/** A rectangle about a centre; `along` is the unit vector of its first side. */
export function rectangle(centre: Point, alongM: number, acrossM: number, along: Point = [1, 0]): Point[] {
  const corner = (a: number, b: number): Point => [
    centre[0] + along[0] * a - along[1] * b,
    centre[1] + along[1] * a + along[0] * b,
  ];
  const [a, b] = [alongM / 2, acrossM / 2];
  return [corner(-a, -b), corner(a, -b), corner(a, b), corner(-a, b)];
}

/** A rectangle by its west, south, east and north sides. */
export function box(westM: number, southM: number, eastM: number, northM: number): Point[] {
  return [
    [westM, southM],
    [eastM, southM],
    [eastM, northM],
    [westM, northM],
  ];
}

export function circle(centre: Point, radiusM: number, corners = 20): Point[] {
  return Array.from({ length: corners }, (_, index) => {
    const angle = (index / corners) * 2 * Math.PI;
    return [centre[0] + radiusM * Math.cos(angle), centre[1] + radiusM * Math.sin(angle)];
  });
}

/** An irregular round area: a wood, a pond, the outline of a far town. */
export function blob(centre: Point, radiusEastM: number, radiusNorthM: number, seed: number): Point[] {
  const corners = circle([0, 0], 1, 12).map(([x, y]): Point => [
    centre[0] + x * radiusEastM,
    centre[1] + y * radiusNorthM,
  ]);
  const sizeM = Math.min(radiusEastM, radiusNorthM);
  const moved = corners.map((corner) => wander(corner, sizeM * 0.55, sizeM * 0.9, seed));
  return smoothRing(moved, Math.max(8, sizeM / 6));
}

export function ringAreaM2(ring: readonly Point[]): number {
  const first = ring[0];
  if (!first) return 0;
  return segmentsOf([...ring, first]).reduce((sum, [a, b]) => sum + a[0] * b[1] - b[0] * a[1], 0) / 2;
}

export function centroid(ring: readonly Point[]): Point {
  const sum = ring.reduce<Point>((total, point) => [total[0] + point[0], total[1] + point[1]], [0, 0]);
  return [sum[0] / ring.length, sum[1] / ring.length];
}

/** Whether a point lies in a ring (even-odd). */
export function isInside([x, y]: Point, ring: readonly Point[]): boolean {
  let isIn = false;
  for (let index = 0, before = ring.length - 1; index < ring.length; before = index, index += 1) {
    const a = ring[index];
    const b = ring[before];
    if (!a || !b) continue;
    if (a[1] > y !== b[1] > y && x < ((b[0] - a[0]) * (y - a[1])) / (b[1] - a[1]) + a[0]) isIn = !isIn;
  }
  return isIn;
}

/** Distance from a point to a straight piece. */
export function distanceToSegmentM(point: Point, a: Point, b: Point): number {
  const squared = (b[0] - a[0]) ** 2 + (b[1] - a[1]) ** 2;
  const share =
    squared === 0 ? 0 : ((point[0] - a[0]) * (b[0] - a[0]) + (point[1] - a[1]) * (b[1] - a[1])) / squared;
  const t = Math.max(0, Math.min(1, share));
  return distanceM(point, [a[0] + (b[0] - a[0]) * t, a[1] + (b[1] - a[1]) * t]);
}
