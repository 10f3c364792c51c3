import { lengthM } from './curves';
import { line, type MapFeature } from './feature';
import { distanceTo, mark } from './grid';
import { isolines, type Grid } from './isolines';
import type { Point } from './plane';
import { noiseAt } from './random';
import { islands, mainland } from './shore';

const STEP_M = 75;
const INTERVAL_M = 10;
const HIGHEST_M = 140;
const lines = (fromM: number, toM: number) =>
  Array.from({ length: Math.ceil((toM - fromM) / STEP_M) }, (_, index) => fromM + index * STEP_M);

/** Height of the land in metres: flat by the water, rolling hills behind, highest in the south and the west. */
function heightM(point: Point, waterM: number): number {
  const [x, y] = point;
  const rise = 1 - Math.exp(-Math.max(0, waterM - 260) / 1500);
  const rolling = 0.62 + 0.55 * noiseAt(point, 2300, 911, 4);
  const upland = 46 + 30 * Math.max(0, -y / 4000) + 22 * Math.max(0, -(x + 2000) / 5000);
  return rise * rolling * upland;
}

/** Height contours of the country about the estuary. */
export function reliefFeatures(): MapFeature[] {
  const eastM = lines(-11_500, 4700);
  const northM = lines(-7000, 7400);
  const land = new Uint8Array(eastM.length * northM.length);
  mark(land, [mainland, ...islands], eastM, northM);
  const waterM = distanceTo(
    land.map((isLand) => (isLand ? 0 : 1)),
    eastM,
    northM,
  );
  const columns = eastM.length;
  const grid: Grid = {
    eastM,
    northM,
    value: waterM.map((awayM, at) =>
      heightM([eastM[at % columns] ?? 0, northM[Math.floor(at / columns)] ?? 0], awayM),
    ),
  };
  const levels = Array.from({ length: HIGHEST_M / INTERVAL_M }, (_, index) => (index + 1) * INTERVAL_M);
  return levels.flatMap((height) =>
    isolines(grid, height)
      .filter((points) => lengthM(points) > 500)
      .map((points) =>
        line('contours', { minzoom: 13 }, points, {
          class: height % 50 === 0 ? 'height-50' : 'height',
          height,
        }),
      ),
  );
}
