import { distanceM, lengthM, offset, placeAt, ribbon, segmentsOf, smooth, smoothRing } from './curves';
import { area, line, type MapFeature } from './feature';
import type { Point } from './plane';
import { Dice, noiseAt } from './random';
import { CHANNELS, type Channel } from './seabed';
import { blob, distanceToSegmentM, isInside } from './shapes';
import { greatCob, littleCob, marshShoreLine } from './shore';

/** The bank that keeps the spring tides off the grazing marsh, from the hythe to the spit. */
export const seaWall: Point[] = smooth(
  [
    [-520, 1000],
    [-250, 1178],
    [150, 1260],
    [600, 1330],
    [1080, 1372],
    [1500, 1400],
    [1950, 1380],
    [2350, 1290],
    [2650, 1128],
    [2860, 955],
  ],
  30,
);

/** Saltmarsh between the shore and the sea wall. */
export const saltmarsh: Point[] = [...marshShoreLine, ...offset(seaWall, -14)];

const reedbeds: Point[][] = [
  [
    [-2330, 268],
    [-2120, 236],
    [-1900, 226],
    [-1660, 262],
    [-1420, 440],
    [-1480, 520],
    [-1720, 420],
    [-2060, 390],
    [-2300, 370],
  ],
  [
    [-1900, -40],
    [-1760, -84],
    [-1600, -150],
    [-1500, -226],
    [-1400, -300],
    [-1440, -330],
    [-1620, -250],
    [-1800, -160],
    [-1920, -120],
  ],
  [
    [-3560, 340],
    [-3300, 372],
    [-3060, 430],
    [-3010, 520],
    [-3260, 500],
    [-3540, 430],
  ],
].map((ring) =>
  smoothRing(
    ring.map(([x = 0, y = 0]): Point => [x, y]),
    20,
  ),
);

/** Land taken from the marsh: flat, wet, cut by straight ditches. */
export const grazingMarsh: Point[] = [
  ...offset(seaWall, 14),
  [2960, 1350],
  [2900, 1640],
  [2440, 1748],
  [1900, 1835],
  [1000, 1876],
  [300, 1784],
  [-100, 1600],
  [-330, 1300],
];

const isClearOfWall = (point: Point) =>
  isInside(point, saltmarsh) && segmentsOf(seaWall).every(([a, b]) => distanceToSegmentM(point, a, b) > 26);

interface Creek {
  points: Point[];
  mouthM: number;
}

/** A creek that winds inland from its mouth and branches; narrower with every branch. */
function creek(
  mouth: Point,
  headingRad: number,
  lengthOfCreekM: number,
  mouthM: number,
  dice: Dice,
): Creek[] {
  const points: Point[] = [mouth];
  const branches: Creek[] = [];
  let at = mouth;
  const phase = dice.between(0, 6);
  const stepM = 9;
  for (let goneM = 0; goneM < lengthOfCreekM; goneM += stepM) {
    const swing = 0.95 * Math.sin(phase + goneM / 30) + 0.8 * noiseAt(at, 110, 131);
    const heading = headingRad + swing;
    at = [at[0] + stepM * Math.cos(heading), at[1] + stepM * Math.sin(heading)];
    if (!isClearOfWall(at)) break;
    points.push(at);
    if (goneM > 30 && mouthM > 3.2 && dice.chance(0.2)) {
      const side = dice.chance(0.5) ? 1 : -1;
      branches.push(
        ...creek(at, headingRad + side * dice.between(0.7, 1.3), lengthOfCreekM * 0.5, mouthM * 0.5, dice),
      );
    }
  }
  return points.length > 4 ? [{ points, mouthM }, ...branches] : branches;
}

const shoreM = lengthM(marshShoreLine);

/** Where the larger creeks of the marsh reach the shore. */
const mouths: Point[] = Array.from({ length: 15 }, (_, index) => {
  const place = placeAt(marshShoreLine, ((index + 0.6) / 15.4) * shoreM);
  return place?.point ?? [0, 0];
});

const creeks: Creek[] = (() => {
  const dice = new Dice(2027);
  return mouths.flatMap((mouth) =>
    creek([mouth[0], mouth[1] + 4], Math.PI / 2 + dice.between(-0.3, 0.3), dice.between(260, 430), 15, dice),
  );
})();

const swatch: Point[] = (CHANNELS[1] ?? []).map(([x, y]): Point => [x, y]);
const southChannel: Point[] = (CHANNELS[0] ?? []).map(([x, y]): Point => [x, y]);

/** A gully over the flats from a point to the nearest part of a channel, winding on its way. */
function gully(from: Point, towards: readonly Point[], widthM: number, seed: number): Channel {
  const line = smooth(towards, 60);
  const end = line.reduce((best, point) => (distanceM(point, from) < distanceM(best, from) ? point : best));
  const steps = 7;
  return Array.from({ length: steps + 1 }, (_, step) => {
    const share = step / steps;
    const plain: Point = [from[0] + (end[0] - from[0]) * share, from[1] + (end[1] - from[1]) * share];
    const sway = 46 * Math.sin(Math.PI * share);
    return [
      plain[0] + sway * noiseAt(plain, 150, seed) * 2,
      plain[1] + sway * noiseAt(plain, 150, seed + 3),
      widthM * (0.6 + 0.9 * share),
      4.25 + 0.7 * share,
    ];
  });
}

const bankHeads: Point[] = [
  [-300, 60],
  [100, 240],
  [420, 120],
  [900, 420],
  [1150, 180],
  [1700, 130],
  [2150, 160],
  [2420, 60],
  [-700, 40],
  [-1050, 260],
];

/** Gullies that drain the flats into the channels. */
export const gullies: Channel[] = [
  ...mouths.map((mouth, index) => gully(mouth, swatch, 26, 151 + index * 7)),
  ...bankHeads.map((head, index) => gully(head, southChannel, 24, 401 + index * 7)),
  ...bankHeads
    .slice(0, 8)
    .map((head, index) => gully([head[0] + 70, head[1] + 30], swatch, 22, 601 + index * 7)),
];

/** Straight ditches that drain the grazing marsh, on a grid that follows the sea wall. */
function ditches(): Point[][] {
  const dice = new Dice(515);
  const inside = (points: Point[]) => {
    const runs: Point[][] = [[]];
    for (const point of points) {
      if (isInside(point, grazingMarsh)) runs.at(-1)?.push(point);
      else runs.push([]);
    }
    return runs.filter((run) => run.length > 3);
  };
  const north = Array.from({ length: 20 }, (_, index) => {
    const x = -300 + index * 165 + dice.between(-30, 30);
    const lean = dice.between(-0.12, 0.12);
    return inside(Array.from({ length: 50 }, (_, step): Point => [x + step * 20 * lean, 950 + step * 20]));
  }).flat();
  const east = [70, 190, 320].flatMap((inM) =>
    inside(smooth(offset(seaWall, inM), 20)).filter(() => dice.chance(0.9)),
  );
  return [...north.filter(() => dice.chance(0.85)), ...east];
}

export function marshFeatures(): MapFeature[] {
  const dice = new Dice(99);
  const pools = Array.from({ length: 46 }, (): Point => [dice.between(-200, 2600), dice.between(930, 1370)])
    .filter(isClearOfWall)
    .map((point, index) => blob(point, dice.between(5, 15), dice.between(4, 10), 700 + index));
  return [
    area('wetland', { minzoom: 11 }, [grazingMarsh], { class: 'grazing-marsh' }),
    area('wetland', { minzoom: 10 }, [saltmarsh], { class: 'saltmarsh' }),
    ...[greatCob, littleCob].map((ring) => area('wetland', { minzoom: 10 }, [ring], { class: 'saltmarsh' })),
    ...reedbeds.map((ring) => area('wetland', { minzoom: 12 }, [ring], { class: 'reedbed' })),
    ...creeks.map(({ points, mouthM }) =>
      area(
        'water',
        { minzoom: mouthM > 10 ? 12 : 14 },
        [ribbon(points, (share) => mouthM * (1.25 - share) + 1)],
        { class: 'creek' },
      ),
    ),
    ...pools.map((ring) => area('water', { minzoom: 14 }, [ring], { class: 'pool' })),
    ...ditches().map((points) => line('water', { minzoom: 13 }, points, { class: 'ditch' })),
    line('structures', { minzoom: 12 }, seaWall, { class: 'sea-wall' }),
  ];
}
