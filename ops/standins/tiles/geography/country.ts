import { bent, halves } from './division';
import { area, type MapFeature, type ZoomRange } from './feature';
import { DISTRICT, ISLAND, maskOver } from './mask';
import type { Point } from './plane';
import { Dice, noiseAt } from './random';
import { box, centroid, ringAreaM2 } from './shapes';
import { mainland } from './shore';

const isIsland = maskOver(ISLAND, 120, [[mainland]]);
const SMALLEST_M2 = 120_000;

const isInDistrict = ([x, y]: Point) =>
  x > DISTRICT.westM + 700 && y > DISTRICT.southM + 600 && y < DISTRICT.northM - 500;

/** Divides the island into large parcels that stand for many fields, and keeps those that lie on it whole. */
function divide(ring: Point[], dice: Dice): Point[][] {
  const sizeM2 = Math.abs(ringAreaM2(ring));
  const wantedM2 = 900_000 * (1 + 0.6 * noiseAt(centroid(ring), 5000, 261));
  if (sizeM2 > 4 * wantedM2) return halves(ring, dice).flatMap((half) => divide(half, dice));
  const corners = bent(ring, 170, 2300, 160);
  const isWhole = corners.every(isIsland);
  if (isWhole && sizeM2 < wantedM2) return [corners];
  if (sizeM2 < SMALLEST_M2 || (!corners.some(isIsland) && sizeM2 < wantedM2)) return [];
  return halves(ring, dice).flatMap((half) => divide(half, dice));
}

function useOf(middle: Point, dice: Dice): string {
  const height = noiseAt(middle, 9000, 263, 3);
  const draw = dice.next();
  if (height > 0.3 && !isInDistrict(middle)) return draw < 0.86 ? 'heath' : 'wood';
  if (noiseAt(middle, 3600, 265, 2) + 0.4 * height > 0.52) return 'wood';
  return draw < 0.05 ? 'wood' : draw < 0.34 ? 'arable' : draw < 0.56 ? 'meadow' : 'pasture';
}

/** Zooms of a coarse parcel: in the district it gives way to the fields and woods that are drawn there. */
function zoomOf(middle: Point, use: string): ZoomRange {
  if (!isInDistrict(middle)) return { minzoom: 8 };
  return { minzoom: 8, maxzoom: use === 'wood' ? 9 : 11 };
}

/** What the island is used for, in coarse parcels: everywhere at small zooms, beyond the district at all. */
export function countryFeatures(): MapFeature[] {
  const dice = new Dice(1066);
  const { westM, southM, eastM, northM } = ISLAND;
  return divide(box(westM, southM, eastM, northM), dice).map((ring) => {
    const middle = centroid(ring);
    const use = useOf(middle, dice);
    return area('landuse', zoomOf(middle, use), [ring], { class: use });
  });
}
