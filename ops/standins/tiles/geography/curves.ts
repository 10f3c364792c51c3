import type { Point } from './plane';
import { noiseAt } from './random';

export function distanceM(a: Point, b: Point): number {
  return Math.hypot(b[0] - a[0], b[1] - a[1]);
}

export function lerp(a: Point, b: Point, t: number): Point {
  return [a[0] + (b[0] - a[0]) * t, a[1] + (b[1] - a[1]) * t];
}

/** Consecutive pairs of points. */
export function segmentsOf(points: readonly Point[]): [Point, Point][] {
  return points.slice(1).map((point, index) => [points[index] ?? point, point]);
}

export function lengthM(points: readonly Point[]): number {
  return segmentsOf(points).reduce((sum, [a, b]) => sum + distanceM(a, b), 0);
}

/** The point of a cubic through b and c at t, its direction there steered by a and d (Catmull and Rom's spline). */
function splinePoint(a: Point, b: Point, c: Point, d: Point, t: number): Point {
  const on = (axis: 0 | 1) => {
    const tangentB = (c[axis] - a[axis]) / 2;
    const tangentC = (d[axis] - b[axis]) / 2;
    const span = c[axis] - b[axis];
    return (
      b[axis] +
      t * (tangentB + t * (3 * span - 2 * tangentB - tangentC + t * (tangentB + tangentC - 2 * span)))
    );
  };
  return [on(0), on(1)];
}

/** Samples of a smooth line through all given points, about every `stepM`; `knot` counts the given points passed. */
export function alongSpline(points: readonly Point[], stepM: number): { point: Point; knot: number }[] {
  const samples = segmentsOf(points).flatMap(([b, c], index) => {
    const steps = Math.max(1, Math.round(distanceM(b, c) / stepM));
    const a = points[index - 1] ?? b;
    const d = points[index + 2] ?? c;
    return Array.from({ length: steps }, (_, step) => ({
      point: splinePoint(a, b, c, d, step / steps),
      knot: index + step / steps,
    }));
  });
  const last = points.at(-1);
  return last ? [...samples, { point: last, knot: points.length - 1 }] : samples;
}

/** A smooth line through all given points, sampled about every `stepM`. */
export function smooth(points: readonly Point[], stepM: number): Point[] {
  return alongSpline(points, stepM).map(({ point }) => point);
}

/** A value given at each knot, between the knots. */
export function atKnot(values: readonly number[], knot: number): number {
  const low = values[Math.floor(knot)] ?? 0;
  const high = values[Math.min(values.length - 1, Math.floor(knot) + 1)] ?? low;
  return low + (high - low) * (knot - Math.floor(knot));
}

/** A smooth closed ring through all given points; its first point is not repeated. */
export function smoothRing(points: readonly Point[], stepM: number): Point[] {
  return points.flatMap((b, index) => {
    const at = (offset: number) => points[(index + offset + points.length) % points.length] ?? b;
    const steps = Math.max(1, Math.round(distanceM(b, at(1)) / stepM));
    return Array.from({ length: steps }, (_, step) => splinePoint(at(-1), b, at(1), at(2), step / steps));
  });
}

/** Points no further than `stepM` apart on the same straight pieces. */
export function densify(points: readonly Point[], stepM: number): Point[] {
  const line = segmentsOf(points).flatMap(([a, b]) => {
    const steps = Math.max(1, Math.ceil(distanceM(a, b) / stepM));
    return Array.from({ length: steps }, (_, step) => lerp(a, b, step / steps));
  });
  const last = points.at(-1);
  return last ? [...line, last] : line;
}

/** Moves a point by smooth noise of the plane: neighbouring lines move together, so shared edges stay shared. */
export function wander(point: Point, heightM: number, wavelengthM: number, seed: number): Point {
  return [
    point[0] + heightM * noiseAt(point, wavelengthM, seed),
    point[1] + heightM * noiseAt(point, wavelengthM, seed + 7),
  ];
}

/** Makes a smooth line rough; its two ends stay where they are. */
export function roughen(
  points: readonly Point[],
  heightM: number,
  wavelengthM: number,
  seed: number,
): Point[] {
  const last = points.length - 1;
  return points.map((point, index) => {
    const fromEnd = Math.min(index, last - index);
    return wander(point, heightM * Math.min(1, fromEnd / 6), wavelengthM, seed);
  });
}

export interface Station {
  point: Point;
  /** Unit vector along the line. */
  along: Point;
  /** Unit vector to the left of the line. */
  left: Point;
  atM: number;
}

/** The place `atM` metres along a line, with its directions; null beyond either end. */
export function placeAt(points: readonly Point[], atM: number): Station | null {
  let passedM = 0;
  for (const [a, b] of segmentsOf(points)) {
    const pieceM = distanceM(a, b);
    if (pieceM > 0 && atM >= passedM && atM <= passedM + pieceM) {
      const along: Point = [(b[0] - a[0]) / pieceM, (b[1] - a[1]) / pieceM];
      return { point: lerp(a, b, (atM - passedM) / pieceM), along, left: [-along[1], along[0]], atM };
    }
    passedM += pieceM;
  }
  return null;
}

/** A line moved sideways, positive to its left. */
export function offset(points: readonly Point[], leftM: number | ((index: number) => number)): Point[] {
  return points.map((point, index) => {
    const before = points[index - 1] ?? point;
    const after = points[index + 1] ?? point;
    const runM = distanceM(before, after) || 1;
    const shiftM = typeof leftM === 'number' ? leftM : leftM(index);
    return [
      point[0] - ((after[1] - before[1]) / runM) * shiftM,
      point[1] + ((after[0] - before[0]) / runM) * shiftM,
    ];
  });
}

/** The area within half a width of a line, as a ring; the width may change along it. */
export function ribbon(points: readonly Point[], widthM: number | ((share: number) => number)): Point[] {
  const halfM = (index: number) =>
    (typeof widthM === 'number' ? widthM : widthM(index / Math.max(1, points.length - 1))) / 2;
  return [...offset(points, halfM), ...offset(points, (index) => -halfM(index)).reverse()];
}
