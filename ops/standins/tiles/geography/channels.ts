import { alongSpline, distanceM, smooth } from './curves';
import type { Point } from './plane';
import { Dice, noiseAt } from './random';
import { marshShoreLine } from './shore';

/** A way that the water keeps open: place, half width and depth below high water, all in metres. */
export type Channel = [eastM: number, northM: number, halfWidthM: number, depthM: number][];

const MAIN_CHANNELS: Channel[] = [
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
    [1060, 640, 60, 5],
    [1010, 480, 44, 4.7],
    [950, 310, 40, 4.6],
    [1010, 120, 46, 4.7],
    [930, -130, 64, 5.2],
  ],
  [
    [-720, 800, 26, 4.6],
    [-600, 660, 30, 4.9],
    [-420, 540, 36, 5],
    [-200, 500, 40, 5.2],
  ],
  [
    [1560, -800, 130, 5.4],
    [1760, -840, 170, 6],
    [2080, -820, 220, 6.6],
    [2260, -680, 240, 7.4],
    [2350, -480, 220, 9],
    [2420, -250, 200, 14],
  ],
  [
    [48, -900, 110, 11],
    [48, -600, 90, 12],
    [60, -480, 120, 13],
  ],
];

const middleOf = (channel: Channel | undefined): Point[] =>
  smooth(
    (channel ?? []).map(([eastM, northM]): Point => [eastM, northM]),
    60,
  );
const river = middleOf(MAIN_CHANNELS[0]);
const swatch = middleOf(MAIN_CHANNELS[1]);

const nearestTo = (point: Point, points: readonly Point[]): Point =>
  points.reduce((best, other) => (distanceM(other, point) < distanceM(best, point) ? other : best));

/** Where the larger creeks of the saltmarsh reach the shore, and gullies go on over the flats. */
export const CREEK_MOUTHS: Point[] = (
  [
    [-330, 897],
    [-60, 890],
    [230, 928],
    [480, 908],
    [610, 934],
    [850, 916],
    [1010, 962],
    [1240, 955],
    [1420, 998],
    [1600, 928],
    [1790, 935],
    [2030, 1012],
    [2240, 968],
    [2480, 896],
  ] as const
).map((point) => nearestTo(point, marshShoreLine));

const TOWARDS_SWATCH: Point[] = [
  ...CREEK_MOUTHS,
  [-1080, 600],
  [-860, 700],
  [-220, 230],
  [160, 330],
  [480, 260],
  [980, 400],
  [1720, 470],
  [2080, 330],
  [2420, 170],
];

const TOWARDS_RIVER: Point[] = [
  [-1420, 260],
  [-1180, 330],
  [-760, 120],
  [-430, 150],
  [-60, 120],
  [260, 110],
  [620, 200],
  [930, 170],
  [1180, 210],
  [1500, 150],
  [1850, 180],
  [2200, 110],
  [-1330, -300],
  [-980, -400],
  [-620, -440],
];

/** A winding line of a channel that narrows from its mouth to its head. */
function winding(head: Point, mouth: Point, mouthHalfM: number, swayM: number, seed: number): Channel {
  const steps = 9;
  return Array.from({ length: steps + 1 }, (_, step) => {
    const share = step / steps;
    const plain: Point = [head[0] + (mouth[0] - head[0]) * share, head[1] + (mouth[1] - head[1]) * share];
    const room = Math.sin(Math.PI * share) ** 0.7;
    return [
      plain[0] + swayM * room * noiseAt(plain, 130, seed, 2) * 2,
      plain[1] + swayM * room * noiseAt(plain, 130, seed + 5, 2) * 2,
      mouthHalfM * (0.5 + 0.5 * share ** 1.4),
      4.2 + 0.9 * share,
    ];
  });
}

/** A gully from its head to the nearest part of a channel, with smaller ones that join it from both sides. */
function gullyTree(head: Point, towards: readonly Point[], seed: number): Channel[] {
  const dice = new Dice(seed);
  const mouth = nearestTo(head, towards);
  const lengthOfGullyM = distanceM(head, mouth);
  const stem = winding(head, mouth, 13 + lengthOfGullyM / 26, 34 + lengthOfGullyM / 9, seed);
  const joins = alongSpline(
    stem.map(([eastM, northM]): Point => [eastM, northM]),
    30,
  ).filter(({ knot }) => knot > 2.2 && knot < 8 && dice.chance(0.4));
  const along: Point = [(mouth[0] - head[0]) / lengthOfGullyM, (mouth[1] - head[1]) / lengthOfGullyM];
  const branches = joins.map(({ point }, index) => {
    const side = dice.chance(0.5) ? 1 : -1;
    const reachM = dice.between(45, 120);
    const backM = dice.between(10, 90);
    const start: Point = [
      point[0] - along[0] * backM - along[1] * side * reachM,
      point[1] - along[1] * backM + along[0] * side * reachM,
    ];
    return winding(start, point, 19, 26, seed + 40 + index * 11);
  });
  return [stem, ...branches];
}

/** Every channel: the river's own, the swatch behind the flats, dredged basins, and the gullies that drain the flats. */
export const CHANNELS: Channel[] = [
  ...MAIN_CHANNELS,
  ...TOWARDS_SWATCH.flatMap((head, index) => gullyTree(head, swatch, 1511 + index * 97)),
  ...TOWARDS_RIVER.flatMap((head, index) => gullyTree(head, river, 4001 + index * 97)),
];
