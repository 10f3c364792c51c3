import { alongSpline, atKnot, offset, roughen, smooth, smoothRing, wander } from './curves';
import type { Point } from './plane';
import { blob } from './shapes';

/** A part of the high-water line, in the order in which the shore runs: coast from the north, estuary, coast to the south. */
interface Stretch {
  points: Point[];
  /** Sampling distance of a natural shore; null: built, drawn as it is. */
  stepM: number | null;
  roughM: number;
  wavelengthM: number;
}

const natural = (points: Point[]): Stretch => ({ points, stepM: 22, roughM: 16, wavelengthM: 170 });
const built = (points: Point[]): Stretch => ({ points, stepM: null, roughM: 0, wavelengthM: 1 });
const far = (points: Point[]): Stretch => ({ points, stepM: 120, roughM: 1100, wavelengthM: 4300 });
const marshEdge = (points: Point[]): Stretch => ({ points, stepM: 12, roughM: 34, wavelengthM: 105 });

const northCoast = natural([
  [3300, 7200],
  [3880, 5700],
  [3720, 4400],
  [3330, 3500],
  [3430, 2800],
  [3170, 2200],
  [3050, 1700],
  [3130, 1280],
  [3350, 900],
  [3640, 590],
  [3830, 370],
  [3790, 262],
  [3700, 238],
  [3540, 350],
  [3290, 580],
  [2960, 760],
  [2640, 850],
]);

/** The seaward edge of the saltmarsh, from the spit to the hythe. */
const marshShore = marshEdge([
  [2640, 850],
  [2360, 930],
  [2060, 1030],
  [1890, 960],
  [1660, 905],
  [1450, 1010],
  [1280, 950],
  [1060, 985],
  [900, 900],
  [650, 945],
  [430, 890],
  [160, 950],
  [-140, 880],
  [-420, 905],
  [-640, 862],
]);

const hythe = built([
  [-640, 862],
  [-700, 850],
  [-704, 826],
  [-726, 824],
  [-728, 844],
  [-860, 812],
]);

/** Middle of the tidal river, from its head down, with its full width. */
const RIVER: [eastM: number, northM: number, widthM: number][] = [
  [-9500, 2300, 9],
  [-8600, 1750, 11],
  [-7600, 1720, 14],
  [-6800, 1160, 18],
  [-6000, 1010, 24],
  [-5300, 640, 32],
  [-4700, 770, 42],
  [-4200, 520, 52],
  [-3700, 260, 62],
  [-3250, 320, 74],
  [-2850, 420, 86],
  [-2480, 270, 104],
  [-2180, 160, 140],
  [-1850, 90, 205],
  [-1600, 20, 290],
];

const riverSamples = alongSpline(
  RIVER.map(([eastM, northM]): Point => [eastM, northM]),
  30,
).map(({ point, knot }) => ({
  point,
  widthM: atKnot(
    RIVER.map(([, , widthM]) => widthM),
    knot,
  ),
}));

const riverMiddle: Point[] = riverSamples.map(({ point }) => point);

function bank(side: 1 | -1): Point[] {
  const widthM = (index: number) => riverSamples[index]?.widthM ?? 0;
  return offset(riverMiddle, (index) => (side * widthM(index)) / 2).map((point, index) =>
    wander(point, 0.12 * widthM(index), 140, side === 1 ? 61 : 67),
  );
}

export const northBankPoints = bank(1);
export const southBankPoints = bank(-1);
const endOf = (points: Point[], fallback: Point): Point => points.at(-1) ?? fallback;

const northBank = natural([[-860, 812], [-1060, 700], [-1290, 500], endOf(northBankPoints, [-1560, 160])]);

const southBank = natural([
  endOf(southBankPoints, [-1640, -115]),
  [-1500, -225],
  [-1370, -310],
  [-1262, -352],
]);

const townQuay = built([
  [-1262, -352],
  [-1200, -372],
  [-1100, -396],
  [-1078, -401],
  [-1076, -394],
  [-1056, -399],
  [-1058, -406],
  [-1040, -412],
  [-700, -462],
  [-420, -498],
  [-404, -520],
  [-384, -518],
  [-366, -506],
  [-300, -520],
]);

/** Silo quay, the Grain Dock and Long Quay. */
const portWalls = built([
  [-300, -520],
  [-190, -570],
  [-6, -570],
  [-6, -612],
  [-34, -632],
  [-34, -930],
  [130, -930],
  [130, -632],
  [102, -612],
  [102, -570],
  [1450, -570],
  [1450, -862],
  [1486, -900],
  [1560, -930],
  [1560, -1008],
  [1820, -1032],
  [1900, -1012],
]);

const southCoast = natural([
  [1900, -1012],
  [2060, -1075],
  [2250, -1200],
  [2470, -1420],
  [2760, -1560],
  [3080, -1620],
  [3370, -1710],
  [3530, -1960],
  [3420, -2290],
  [3290, -2660],
  [3430, -3110],
  [3380, -3620],
  [3100, -4400],
  [3230, -5300],
]);

const farCoast = far([
  [3230, -5300],
  [2900, -6800],
  [1800, -8600],
  [900, -10200],
  [-900, -12600],
  [-1200, -14700],
  [-3900, -16500],
  [-5900, -19000],
  [-8600, -19900],
  [-10300, -19500],
  [-11400, -19000],
  [-12700, -20400],
  [-13900, -22800],
  [-18000, -22300],
  [-21200, -19300],
  [-23900, -19800],
  [-26500, -22700],
  [-31000, -24300],
  [-35600, -21900],
  [-37200, -18600],
  [-41000, -16900],
  [-44800, -13200],
  [-42400, -11500],
  [-39200, -10700],
  [-36900, -9800],
  [-37600, -8700],
  [-40300, -8300],
  [-43200, -6300],
  [-43900, -2900],
  [-41200, -500],
  [-41900, 2500],
  [-46200, 4700],
  [-45400, 7900],
  [-41500, 9800],
  [-39300, 12600],
  [-36900, 15700],
  [-40600, 16400],
  [-43600, 19700],
  [-40200, 23300],
  [-33900, 23900],
  [-29600, 21200],
  [-26700, 20400],
  [-23400, 23900],
  [-19400, 26600],
  [-14300, 24900],
  [-11900, 21500],
  [-9700, 17900],
  [-8200, 17800],
  [-7400, 20300],
  [-4500, 19300],
  [-3800, 15900],
  [-900, 14700],
  [300, 11800],
  [2300, 9500],
  [3300, 7200],
]);

function drawn({ points, stepM, roughM, wavelengthM }: Stretch, seed: number): Point[] {
  return stepM === null ? points : roughen(smooth(points, stepM), roughM, wavelengthM, seed);
}

export const marshShoreLine: Point[] = drawn(marshShore, 12);
/** The far coast, rough at two scales: bays, and the rocks within them. */
const farCoastLine: Point[] = roughen(drawn(farCoast, 17), 420, 1100, 19);

/** The mainland's high-water line as one ring. */
export const mainland: Point[] = [
  ...drawn(northCoast, 11),
  ...marshShoreLine,
  ...hythe.points,
  ...drawn(northBank, 13),
  ...[...northBankPoints].reverse(),
  ...southBankPoints,
  ...drawn(southBank, 14),
  ...townQuay.points,
  ...portWalls.points,
  ...drawn(southCoast, 15),
  ...farCoastLine.slice(0, -1),
];

const islet = (points: Point[], seed: number) =>
  smoothRing(points, 18).map((point) => wander(point, 18, 120, seed));

export const greatCob: Point[] = islet(
  [
    [1180, 330],
    [1330, 425],
    [1560, 452],
    [1800, 400],
    [2010, 352],
    [2090, 280],
    [1900, 240],
    [1690, 268],
    [1480, 214],
    [1300, 240],
  ],
  21,
);

export const littleCob: Point[] = islet(
  [
    [560, 330],
    [660, 372],
    [790, 350],
    [850, 300],
    [760, 268],
    [630, 282],
  ],
  23,
);

const skerries: Point[][] = [
  blob([5200, 10_900], 620, 260, 1801),
  blob([6300, 10_300], 240, 160, 1803),
  blob([-47_600, 900], 900, 1500, 1805),
  blob([-48_300, -1400], 320, 420, 1807),
  blob([-15_900, -25_300], 1100, 480, 1809),
  blob([-28_200, 25_800], 700, 420, 1811),
];

export const islands: Point[][] = [greatCob, littleCob, ...skerries];
