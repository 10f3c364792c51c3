import { lerp, offset, smooth } from './curves';
import { area, line, type MapFeature } from './feature';
import type { Point } from './plane';
import { rectangle, box } from './shapes';

/** The line from the island's west, through the town station to the yard. */
const mainLine: Point[] = smooth(
  [
    [-16000, -3300],
    [-11000, -3250],
    [-7500, -2750],
    [-4500, -2350],
    [-3400, -2150],
    [-2600, -1850],
    [-1950, -1622],
    [-1350, -1552],
    [-900, -1535],
    [-560, -1512],
  ],
  40,
);

const outerLine: Point[] = smooth(
  [
    [-36100, -10000],
    [-33500, -8200],
    [-28500, -3800],
    [-24500, 7600],
    [-22500, 5600],
    [-19000, -800],
    [-16000, -3300],
  ],
  250,
);

const YARD_WEST: Point = [-560, -1512];
const YARD_EAST: Point = [1010, -1462];
const TRACK_SPACING_M = 5.6;
const TRACKS = 11;

/** The yard's tracks: they fan out from its west throat and close up again at its east throat, Yard End. */
function yardTracks(): Point[][] {
  const middle = (TRACKS - 1) / 2;
  return Array.from({ length: TRACKS }, (_, index) => {
    const sideM = (index - middle) * TRACK_SPACING_M;
    const fan = 0.05 + 0.019 * Math.abs(index - middle);
    const body = offset([lerp(YARD_WEST, YARD_EAST, fan), lerp(YARD_WEST, YARD_EAST, 1 - fan)], sideM);
    const ease = offset(
      [lerp(YARD_WEST, YARD_EAST, fan - 0.018), lerp(YARD_WEST, YARD_EAST, 1.018 - fan)],
      sideM * 0.8,
    );
    const [bodyWest, bodyEast] = body;
    const [easeWest, easeEast] = ease;
    return [YARD_WEST, easeWest, bodyWest, bodyEast, easeEast, YARD_EAST].filter(
      (point) => point !== undefined,
    );
  });
}

const portSpur = smooth(
  [
    [1010, -1462],
    [1210, -1455],
    [1410, -1415],
    [1530, -1310],
    [1570, -1180],
    [1530, -1070],
    [1430, -1005],
    [1300, -988],
  ],
  15,
);

const siloSiding = smooth(
  [
    [-560, -1512],
    [-420, -1478],
    [-290, -1395],
    [-200, -1270],
    [-160, -1120],
    [-152, -960],
    [-150, -800],
    [-150, -620],
  ],
  15,
);

const terminalSidings: Point[][] = [0, 1, 2, 3].map((index) => [
  [1300, -988],
  [1300 - 70 - index * 14, -988 - index * 5.2],
  [430 + index * 20, -988 - index * 5.2],
]);

/** Everything that trains run on, for keeping other things off. */
export const railWays: Point[][] = [mainLine, portSpur, siloSiding];

/** Platforms and buildings of the town station; the buildings are drawn by `landmarks.ts`. */
const platforms: Point[][] = [
  rectangle([-1150, -1530], 170, 6, [0.999, 0.034]),
  rectangle([-1150, -1562], 170, 6, [0.999, 0.034]),
];

export function railwayFeatures(): MapFeature[] {
  return [
    line('rail', { minzoom: 8 }, outerLine, { class: 'main' }),
    line('rail', { minzoom: 8 }, mainLine, { class: 'main', name: 'Merrow line' }),
    line('rail', { minzoom: 11 }, [YARD_WEST, YARD_EAST], { class: 'main' }),
    line('rail', { minzoom: 12 }, portSpur, { class: 'branch' }),
    line('rail', { minzoom: 12 }, siloSiding, { class: 'branch' }),
    line('rail', { minzoom: 14 }, offset(mainLine.slice(-32), 4.2), { class: 'siding' }),
    ...yardTracks().map((points) => line('rail', { minzoom: 13 }, points, { class: 'siding' })),
    ...terminalSidings.map((points) => line('rail', { minzoom: 14 }, points, { class: 'siding' })),
    ...platforms.map((ring) => area('structures', { minzoom: 15 }, [ring], { class: 'platform' })),
    area('structures', { minzoom: 15 }, [box(300, -1590, 430, -1568)], { class: 'platform' }),
  ];
}
