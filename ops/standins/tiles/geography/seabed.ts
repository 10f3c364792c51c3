import { alongSpline, atKnot, wander } from './curves';
import { CHANNELS, type Channel } from './channels';
import { distanceTo, firstAtLeast, gridLines, mark } from './grid';
import type { Grid } from './isolines';
import type { Point } from './plane';
import { noiseAt } from './random';
import { islands, mainland } from './shore';

/** Metres between the high-water line of the drawing and chart datum: what lies shallower than this dries. */
export const TIDE_RANGE_M = 4;

const step01 = (from: number, to: number, value: number) => {
  const t = Math.max(0, Math.min(1, (value - from) / (to - from)));
  return t * t * (3 - 2 * t);
};

/** 1 within the estuary, falling to 0 on the open coast. */
export function estuaryShare(point: Point): number {
  const [x, y] = wander(point, 420, 900, 47);
  return (
    step01(-6000, -4000, x) *
    (1 - step01(2300, 3700, x)) *
    step01(-1500, -1050, y) *
    (1 - step01(1300, 2600, y))
  );
}

/** Depth below high water without channels, from the distance to the shore. */
function plainDepthM(point: Point, shoreM: number): number {
  const rough = noiseAt(point, 340, 41, 4);
  const swell = noiseAt(point, 2400, 43, 3);
  const flat = 0.5 + 2.5 * (1 - Math.exp(-shoreM / 90)) + 1.75 * rough;
  const sea =
    1.2 + 7 * (1 - Math.exp(-shoreM / 420)) + (shoreM / 260) * (1 + 0.45 * swell) + 0.9 * rough + 1.4 * swell;
  const share = estuaryShare(point);
  return Math.max(0.2, flat * share + sea * (1 - share));
}

/** The tidal river above the town is too narrow for the grid: it keeps this depth, and its banks hide the rest. */
const NARROWS = { westM: -11_000, eastM: -3050, southM: -300, northM: 2900, depthM: 4.8 } as const;

function isInNarrows([x, y]: Point): boolean {
  return x > NARROWS.westM && x < NARROWS.eastM && y > NARROWS.southM && y < NARROWS.northM;
}

/** A bed being made, with the place of each crossing moved a little, so that channels have uneven sides. */
interface Bed extends Grid {
  moved: Point[];
}

/** Lets a channel cut into the bed, deepest in its middle. */
function carve(bed: Bed, channel: Channel): void {
  const halfWidths = channel.map(([, , half]) => half);
  const depths = channel.map(([, , , depth]) => depth);
  const middle = alongSpline(
    channel.map(([eastM, northM]): Point => [eastM, northM]),
    12,
  );
  for (const { point, knot } of middle) deepen(bed, point, atKnot(halfWidths, knot), atKnot(depths, knot));
}

const MOST_MOVED_M = 34;

function deepen(bed: Bed, [x, y]: Point, halfWidthM: number, deepestM: number): void {
  const columns = bed.eastM.length;
  const isWide = halfWidthM > 45;
  const reachM = halfWidthM + (isWide ? MOST_MOVED_M : 0);
  const lastRow = firstAtLeast(bed.northM, y + reachM);
  const lastColumn = firstAtLeast(bed.eastM, x + reachM);
  for (let row = firstAtLeast(bed.northM, y - reachM); row < lastRow; row += 1) {
    for (let column = firstAtLeast(bed.eastM, x - reachM); column < lastColumn; column += 1) {
      const at = row * columns + column;
      const plain: Point = [bed.eastM[column] ?? 0, bed.northM[row] ?? 0];
      const [placeX, placeY] = isWide ? (bed.moved[at] ?? plain) : plain;
      const awayM = Math.hypot(placeX - x, placeY - y);
      if (awayM >= halfWidthM) continue;
      const depthM = deepestM * (1 - (awayM / halfWidthM) ** 2) ** 0.6;
      bed.value[at] = Math.max(bed.value[at] ?? 0, depthM);
    }
  }
}

/** Carries the depth beside a shore some crossings inland, so that deep water reaches a quay wall without a rim of mud. */
function spillOverShore(bed: Grid, land: Uint8Array): void {
  const columns = bed.eastM.length;
  for (let pass = 0; pass < 3; pass += 1) {
    const before = bed.value.slice();
    land.forEach((isLand, at) => {
      if (!isLand) return;
      const around = [at - 1, at + 1, at - columns, at + columns].map((index) => before[index] ?? 0);
      bed.value[at] = Math.max(before[at] ?? 0, ...around);
    });
  }
}

/** Depth below high water in metres, over the estuary and the sea around the island; little or nothing on land. */
export function seabed(): Grid {
  const eastM = gridLines(-2500, 3400, 300_000);
  const northM = gridLines(-1100, 1120, 300_000);
  const land = new Uint8Array(eastM.length * northM.length);
  mark(land, [mainland, ...islands], eastM, northM);
  const shoreM = distanceTo(land, eastM, northM);
  const points = northM.flatMap((y) => eastM.map((x): Point => [x, y]));
  const bed: Bed = {
    eastM,
    northM,
    value: Float64Array.from(points, (point, at) => (land[at] ? 0 : plainDepthM(point, shoreM[at] ?? 0))),
    moved: points.map((point) => wander(point, MOST_MOVED_M, 210, 53)),
  };
  for (const channel of CHANNELS) carve(bed, channel);
  spillOverShore(bed, land);
  points.forEach((point, at) => {
    if (isInNarrows(point)) bed.value[at] = Math.max(bed.value[at] ?? 0, NARROWS.depthM);
  });
  return { eastM, northM, value: bed.value };
}
