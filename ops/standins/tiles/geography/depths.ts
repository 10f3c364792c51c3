import { area, line, spot, type MapFeature } from './feature';
import { isLand } from './ground';
import { areasAbove, isolines, type Grid } from './isolines';
import type { Point } from './plane';
import { estuaryShare, seabed, TIDE_RANGE_M } from './seabed';
import { ringAreaM2 } from './shapes';
import { lengthM } from './curves';

/** Below every depth there is: the tint under all others. */
const WHOLE_BED = -100;

/** Depths in metres below chart datum at which the water changes its tint. */
const TINT_DEPTHS_M = [WHOLE_BED, 0, 5, 10, 20] as const;
const CONTOUR_DEPTHS_M = [0, 2, 5, 10, 15, 20] as const;
const SMALLEST_AREA_M2 = 1500;

/** The parts of the bed that dry, on one side of where the estuary ends. */
function dryingGrid(bed: Grid, isEstuary: boolean): Grid {
  const columns = bed.eastM.length;
  return {
    ...bed,
    value: bed.value.map((depthM, at) => {
      const point: Point = [bed.eastM[at % columns] ?? 0, bed.northM[Math.floor(at / columns)] ?? 0];
      const share = estuaryShare(point);
      const outsideM = 12 * (isEstuary ? 0.5 - share : share - 0.5);
      return -Math.max(depthM, TIDE_RANGE_M + outsideM);
    }),
  };
}

function drying(bed: Grid, kind: 'mud' | 'sand'): MapFeature[] {
  return areasAbove(dryingGrid(bed, kind === 'mud'), -TIDE_RANGE_M)
    .filter(([outer]) => outer !== undefined && ringAreaM2(outer) > SMALLEST_AREA_M2)
    .map((rings) => area('wetland', { minzoom: 9 }, rings, { class: kind }));
}

/** Soundings: depths below chart datum in whole metres at places over the deeper water. */
function soundings(bed: Grid): MapFeature[] {
  const columns = bed.eastM.length;
  const features: MapFeature[] = [];
  for (let x = -3000; x < 5200; x += 260) {
    for (let y = -4200; y < 4300; y += 220) {
      const at: Point = [x + ((y / 220) % 2) * 90, y + ((x / 260) % 3) * 30];
      const column = bed.eastM.findIndex((east) => east >= at[0]);
      const row = bed.northM.findIndex((north) => north >= at[1]);
      const depthM = (bed.value[row * columns + column] ?? 0) - TIDE_RANGE_M;
      const isWater = [-40, 0, 40].every((offM) => !isLand([at[0] + offM, at[1] + offM]));
      if (isWater && depthM > 1.5) {
        features.push(
          spot('contours', { minzoom: 14 }, at, { class: 'sounding', depth: Math.round(depthM) }),
        );
      }
    }
  }
  return features;
}

/** Sea, tinted by depth, with what dries at low water, and depth contours. */
export function seaFeatures(): MapFeature[] {
  const bed = seabed();
  const tints = TINT_DEPTHS_M.flatMap((depth) =>
    areasAbove(bed, depth + TIDE_RANGE_M)
      .filter(([outer]) => outer !== undefined && ringAreaM2(outer) > SMALLEST_AREA_M2)
      .map((rings) => area('water', { minzoom: depth > 10 ? 5 : 8 }, rings, { class: 'sea', depth })),
  );
  const contours = CONTOUR_DEPTHS_M.flatMap((depth) =>
    isolines(bed, depth + TIDE_RANGE_M)
      .filter((points) => lengthM(points) > 260)
      .map((points) => line('contours', { minzoom: 12 }, points, { class: 'depth', depth })),
  );
  return [...tints, ...drying(bed, 'sand'), ...drying(bed, 'mud'), ...contours, ...soundings(bed)];
}
