import { densify, distanceM, lerp, wander } from './curves';
import { area, line, type MapFeature } from './feature';
import { districtMask, isLand } from './ground';
import { grazingMarsh, saltmarsh } from './marsh';
import type { Point } from './plane';
import { Dice, noiseAt } from './random';
import { box, centroid, ringAreaM2 } from './shapes';
import { woods } from './woods';
import { zones } from './zones';

const SMALLEST_M2 = 2500;
const SURELY_TOO_LARGE_M2 = 150_000;
const isClosed = districtMask(
  [...zones.map(({ ring }) => ring), saltmarsh, grazingMarsh, ...woods].map((ring) => [ring]),
);

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
function halves(ring: readonly Point[], dice: Dice): [Point[], Point[]] {
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

const isFree = (point: Point) => isLand(point) && !isClosed(point);

/** Large where the land is high, in the west; small near the river and the town. */
function wantedM2(at: Point): number {
  const far = Math.min(1, distanceM(at, [-800, -400]) / 7000);
  return (16_000 + 52_000 * far) * (1 + 0.5 * noiseAt(at, 1300, 211));
}

const bent = (ring: readonly Point[]) =>
  densify([...ring, ring[0] ?? [0, 0]], 45)
    .slice(0, -1)
    .map((point) => wander(point, 34, 520, 219));

/** Divides the country into fields until they are small enough and keep off everything else. */
function divide(ring: Point[], dice: Dice): Point[][] {
  const sizeM2 = Math.abs(ringAreaM2(ring));
  if (sizeM2 > SURELY_TOO_LARGE_M2) return halves(ring, dice).flatMap((half) => divide(half, dice));
  const corners = bent(ring);
  const middle = centroid(corners);
  const free = corners.filter(isFree).length;
  const isWhole = free === corners.length && isFree(middle);
  if (isWhole && sizeM2 < wantedM2(middle)) return [corners];
  if (sizeM2 < SMALLEST_M2) return [];
  if (free === 0 && !isFree(middle) && sizeM2 < 30_000) return [];
  return halves(ring, dice).flatMap((half) => divide(half, dice));
}

const USES = ['pasture', 'pasture', 'pasture', 'arable', 'arable', 'meadow'] as const;

/** Hedged fields of the country about the estuary, fewer of them tinted towards the edge of the detailed map. */
export function fieldFeatures(): MapFeature[] {
  const dice = new Dice(1861);
  const fields = divide(box(-10_800, -6400, 4600, 6900), dice);
  return fields.flatMap((ring) => {
    const edge = Math.min(1, distanceM(centroid(ring), [-1500, 0]) / 9500);
    const use = dice.chance(1 - 0.75 * edge ** 2)
      ? (USES[Math.floor(dice.next() * USES.length)] ?? 'pasture')
      : null;
    const hedge = line('landuse', { minzoom: 13 }, [...ring, ring[0] ?? [0, 0]], { class: 'hedge' });
    return use ? [area('landuse', { minzoom: 12 }, [ring], { class: use }), hedge] : [hedge];
  });
}
