import { alongSpline, atKnot } from './curves';
import { distanceTo, firstAtLeast, gridLines, mark } from './grid';
import type { Grid } from './isolines';
import type { Point } from './plane';
import { noiseAt } from './random';
import { islands, mainland } from './shore';

/** Metres between the high-water line of the drawing and chart datum: what lies shallower than this dries. */
export const TIDE_RANGE_M = 4;

/** A way that the water keeps open: place, half width and depth below high water, all in metres. */
export type Channel = [eastM: number, northM: number, halfWidthM: number, depthM: number][];

export const CHANNELS: Channel[] = [
  [
    [-3250, 320, 30, 4.6],
    [-2850, 420, 34, 5],
    [-2480, 270, 40, 5.4],
    [-2180, 160, 50, 5.8],
    [-1850, 90, 70, 6.2],
    [-1500, -40, 95, 6.6],
    [-1150, -150, 130, 7],
    [-700, -260, 160, 8.5],
    [0, -380, 210, 13],
    [700, -400, 240, 16.5],
    [1400, -390, 250, 17],
    [2000, -310, 240, 16],
    [2700, -150, 260, 15.5],
    [3400, -40, 330, 16],
    [4300, 0, 420, 17],
    [5600, 60, 560, 19],
    [8000, 100, 800, 22],
  ],
  [
    [-1150, 100, 60, 4.7],
    [-700, 300, 62, 5],
    [-250, 520, 60, 5.2],
    [350, 640, 66, 5.4],
    [1000, 660, 76, 5.8],
    [1650, 610, 84, 6.2],
    [2250, 470, 100, 6.8],
    [2700, 240, 120, 8],
    [3000, 40, 150, 10],
  ],
  [
    [-720, 800, 26, 4.6],
    [-600, 660, 30, 4.9],
    [-420, 540, 36, 5],
    [-200, 500, 40, 5.2],
  ],
  [
    [2050, -880, 200, 6],
    [2250, -700, 230, 7],
    [2350, -480, 220, 9],
    [2420, -250, 200, 14],
  ],
  [
    [48, -900, 110, 11],
    [48, -600, 90, 12],
    [60, -480, 120, 13],
  ],
];

const step01 = (from: number, to: number, value: number) => {
  const t = Math.max(0, Math.min(1, (value - from) / (to - from)));
  return t * t * (3 - 2 * t);
};

/** 1 within the estuary, falling to 0 on the open coast. */
export function estuaryShare([x, y]: Point): number {
  return (1 - step01(2300, 3700, x)) * step01(-1500, -1050, y) * (1 - step01(1300, 2600, y));
}

/** Depth below high water without channels, from the distance to the shore. */
function plainDepthM(point: Point, shoreM: number): number {
  const rough = noiseAt(point, 420, 41, 4);
  const flat = 0.5 + 2.6 * (1 - Math.exp(-shoreM / 90)) + 1.15 * rough;
  const sea = 1.2 + 7 * (1 - Math.exp(-shoreM / 420)) + shoreM / 260 + rough * (1 + shoreM / 900);
  const share = estuaryShare(point);
  return Math.max(0.2, flat * share + sea * (1 - share));
}

/** Lets a channel cut into the bed, deepest in its middle. */
function carve(bed: Grid, channel: Channel): void {
  const middle = alongSpline(
    channel.map(([eastM, northM]): Point => [eastM, northM]),
    15,
  );
  for (const { point, knot } of middle) {
    const halfWidthM = atKnot(
      channel.map(([, , half]) => half),
      knot,
    );
    const deepestM = atKnot(
      channel.map(([, , , depth]) => depth),
      knot,
    );
    deepenAround(bed, point, halfWidthM, deepestM);
  }
}

function deepenAround(bed: Grid, [x, y]: Point, halfWidthM: number, deepestM: number): void {
  const columns = bed.eastM.length;
  const lastRow = firstAtLeast(bed.northM, y + halfWidthM);
  const lastColumn = firstAtLeast(bed.eastM, x + halfWidthM);
  for (let row = firstAtLeast(bed.northM, y - halfWidthM); row < lastRow; row += 1) {
    for (let column = firstAtLeast(bed.eastM, x - halfWidthM); column < lastColumn; column += 1) {
      const awayM = Math.hypot((bed.eastM[column] ?? 0) - x, (bed.northM[row] ?? 0) - y);
      const depthM = deepestM * (1 - (awayM / halfWidthM) ** 2) ** 0.6;
      const at = row * columns + column;
      if (awayM < halfWidthM) bed.value[at] = Math.max(bed.value[at] ?? 0, depthM);
    }
  }
}

/** Carries the depth beside a shore two crossings inland, so that deep water reaches a quay wall without a rim of mud. */
function spillOverShore(bed: Grid, land: Uint8Array): void {
  const columns = bed.eastM.length;
  for (let pass = 0; pass < 2; pass += 1) {
    const before = bed.value.slice();
    land.forEach((isLand, at) => {
      if (!isLand) return;
      const around = [at - 1, at + 1, at - columns, at + columns].map((index) => before[index] ?? 0);
      bed.value[at] = Math.max(before[at] ?? 0, ...around);
    });
  }
}

/** Depth below high water in metres, over the estuary and the sea around the island; 0 on land. */
export function seabed(gullies: readonly Channel[]): Grid {
  const eastM = gridLines(-3400, 5200, 70_000);
  const northM = gridLines(-4400, 4400, 70_000);
  const land = new Uint8Array(eastM.length * northM.length);
  mark(land, [mainland, ...islands], eastM, northM);
  const shoreM = distanceTo(land, eastM, northM);
  const bed: Grid = { eastM, northM, value: new Float64Array(land.length) };
  northM.forEach((y, row) =>
    eastM.forEach((x, column) => {
      const at = row * eastM.length + column;
      if (!land[at]) bed.value[at] = plainDepthM([x, y], shoreM[at] ?? 0);
    }),
  );
  for (const channel of [...CHANNELS, ...gullies]) carve(bed, channel);
  spillOverShore(bed, land);
  return bed;
}
