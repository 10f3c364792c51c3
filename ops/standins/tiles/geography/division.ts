import { densify, distanceM, lerp, wander } from './curves';
import type { Point } from './plane';
import type { Dice } from './random';

/** The part of a convex ring on the left of a line through `through` along `along`. */
function cut(ring: readonly Point[], through: Point, along: Point): Point[] {
  const side = ([x, y]: Point) => along[0] * (y - through[1]) - along[1] * (x - through[0]);
  return ring.flatMap((a, index) => {
    const b = ring[(index + 1) % ring.length] ?? a;
    const [sideA, sideB] = [side(a), side(b)];
    const kept = sideA >= 0 ? [a] : [];
    return sideA >= 0 === sideB >= 0 ? kept : [...kept, lerp(a, b, sideA / (sideA - sideB))];
  });
}

/** Divides a ring across its longest side, about the middle and a little askew. */
export function halves(ring: readonly Point[], dice: Dice): [Point[], Point[]] {
  let longest: [Point, Point] = [
    [0, 0],
    [0, 0],
  ];
  ring.forEach((a, index) => {
    const b = ring[(index + 1) % ring.length] ?? a;
    if (distanceM(a, b) > distanceM(...longest)) longest = [a, b];
  });
  const [a, b] = longest;
  const through = lerp(a, b, dice.between(0.36, 0.64));
  const turn = Math.PI / 2 + dice.between(-0.16, 0.16);
  const lengthOfSideM = distanceM(a, b) || 1;
  const [x, y] = [(b[0] - a[0]) / lengthOfSideM, (b[1] - a[1]) / lengthOfSideM];
  const along: Point = [x * Math.cos(turn) - y * Math.sin(turn), x * Math.sin(turn) + y * Math.cos(turn)];
  return [cut(ring, through, along), cut(ring, through, [-along[0], -along[1]])];
}

/** The same ring with bent sides; neighbours bend alike. */
export function bent(ring: readonly Point[], heightM: number, wavelengthM: number, stepM: number): Point[] {
  return densify([...ring, ring[0] ?? [0, 0]], stepM)
    .slice(0, -1)
    .map((point) => wander(point, heightM, wavelengthM, 219));
}
