import { distanceM } from './curves';
import { bent, halves } from './division';
import { area, line, type MapFeature } from './feature';
import { isLand } from './ground';
import { grazingMarsh, saltmarsh } from './marsh';
import { DISTRICT, maskOver } from './mask';
import type { Point } from './plane';
import { Dice, noiseAt } from './random';
import { box, centroid, ringAreaM2 } from './shapes';
import { isWooded } from './woods';
import { zones } from './zones';

const SMALLEST_M2 = 4200;
const SURELY_TOO_LARGE_M2 = 150_000;
const isClosed = maskOver(
  DISTRICT,
  20,
  [...zones.map(({ ring }) => ring), saltmarsh, grazingMarsh].map((ring) => [ring]),
);
const isFree = (point: Point) => isLand(point) && !isClosed(point);

/** Large where the land is high, in the west; small near the river and the town. */
function wantedM2(at: Point): number {
  const far = Math.min(1, distanceM(at, [-800, -400]) / 7000);
  return (16_000 + 52_000 * far) * (1 + 0.5 * noiseAt(at, 1300, 211));
}

/** Divides the country into fields until they are small enough and keep off everything else. */
function divide(ring: Point[], dice: Dice): Point[][] {
  const sizeM2 = Math.abs(ringAreaM2(ring));
  if (sizeM2 > SURELY_TOO_LARGE_M2) return halves(ring, dice).flatMap((half) => divide(half, dice));
  const corners = bent(ring, 34, 520, 45);
  const middle = centroid(corners);
  const free = corners.filter(isFree).length;
  const isWhole = free === corners.length && isFree(middle);
  if (isWhole && sizeM2 < wantedM2(middle)) return [corners];
  if (sizeM2 < SMALLEST_M2) return [];
  if (free === 0 && !isFree(middle) && sizeM2 < 30_000) return [];
  return halves(ring, dice).flatMap((half) => divide(half, dice));
}

const USES = ['pasture', 'pasture', 'pasture', 'arable', 'arable', 'meadow'] as const;

export interface Parcel {
  ring: Point[];
  use: (typeof USES)[number] | 'wood' | null;
}

/** The hedged fields and the woods of the district; fewer fields are tinted towards its edge. */
export const parcels: Parcel[] = (() => {
  const dice = new Dice(1861);
  return divide(box(-10_800, -6400, 4600, 6900), dice).map((ring): Parcel => {
    const middle = centroid(ring);
    const edge = Math.min(1, distanceM(middle, [-1500, 0]) / 9500);
    const isTinted = dice.chance(1 - 0.75 * edge ** 2);
    const use = USES[Math.floor(dice.next() * USES.length)] ?? 'pasture';
    if (isWooded(middle, dice.next())) return { ring, use: 'wood' };
    return { ring, use: isTinted ? use : null };
  });
})();

export function fieldFeatures(): MapFeature[] {
  return parcels.flatMap(({ ring, use }) => {
    if (use === 'wood') return [area('landuse', { minzoom: 10 }, [ring], { class: use })];
    const hedge = line('landuse', { minzoom: 13 }, [...ring, ring[0] ?? [0, 0]], { class: 'hedge' });
    return use ? [area('landuse', { minzoom: 12 }, [ring], { class: use }), hedge] : [hedge];
  });
}
