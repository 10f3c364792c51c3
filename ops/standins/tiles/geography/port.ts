import { area, line, spot, type MapFeature } from './feature';
import type { Point } from './plane';
import { Dice } from './random';
import { box, circle } from './shapes';
import { ribbon, roughen, smooth } from './curves';

/** A building of the port, placed by hand. */
export const portBuildings: { ring: Point[]; kind: string; name?: string }[] = [
  { ring: box(-134, -792, -66, -772), kind: 'silo', name: 'Grain silo' },
  { ring: box(-132, -640, -60, -616), kind: 'industrial' },
  { ring: box(-196, -905, -164, -840), kind: 'industrial' },
  { ring: box(-130, -905, -58, -830), kind: 'industrial', name: 'Malt store' },
  { ring: box(158, -706, 226, -632), kind: 'industrial', name: 'Shed 1' },
  { ring: box(158, -792, 226, -718), kind: 'industrial', name: 'Shed 2' },
  { ring: box(158, -884, 226, -804), kind: 'industrial', name: 'Shed 3' },
  { ring: box(246, -760, 318, -650), kind: 'industrial', name: 'Shed 4' },
  { ring: box(246, -884, 318, -772), kind: 'industrial', name: 'Shed 5' },
  { ring: box(146, -1070, 286, -1018), kind: 'industrial' },
  { ring: box(306, -1084, 520, -1026), kind: 'industrial', name: 'Transit store' },
  { ring: box(548, -1080, 760, -1030), kind: 'industrial' },
  { ring: box(196, -1196, 300, -1110), kind: 'industrial' },
  { ring: box(326, -1210, 470, -1120), kind: 'industrial', name: 'Cold store' },
  { ring: box(500, -1190, 640, -1116), kind: 'industrial' },
  { ring: box(670, -1206, 880, -1120), kind: 'industrial' },
  { ring: box(190, -1346, 330, -1244), kind: 'industrial' },
  { ring: box(360, -1350, 560, -1252), kind: 'industrial' },
  { ring: box(600, -1336, 760, -1250), kind: 'industrial' },
  { ring: box(800, -1330, 1020, -1250), kind: 'industrial' },
  { ring: box(920, -1190, 1040, -1120), kind: 'industrial' },
  { ring: box(1260, -1230, 1400, -1130), kind: 'industrial' },
  { ring: box(1230, -1350, 1370, -1280), kind: 'industrial' },
  { ring: box(1296, -880, 1376, -832), kind: 'industrial', name: 'Workshop' },
  { ring: box(1396, -790, 1428, -742), kind: 'industrial' },
  { ring: box(1040, -1090, 1100, -1058), kind: 'industrial', name: 'Port office' },
  { ring: box(1404, -694, 1424, -678), kind: 'industrial', name: 'Pilot station' },
];

/** Circular grain bins, two rows of six. */
const bins: Point[][] = [0, 1, 2, 3, 4, 5].flatMap((row) =>
  [-113, -87].map((x) => circle([x, -758 + row * 22], 10.5, 18)),
);

const CONTAINER = { longM: 12.2, wideM: 2.45 } as const;

interface Stack {
  westM: number;
  southM: number;
  columns: number;
  rows: number;
  kind: 'container' | 'reefer';
}

const STACK_COLUMNS_EAST_M = [366, 560, 754, 948];
const STACK_ROWS_NORTH_M = [-684, -722, -760, -798, -836, -874];

const stacks: Stack[] = [
  ...STACK_COLUMNS_EAST_M.flatMap((westM) =>
    STACK_ROWS_NORTH_M.map((southM): Stack => ({ westM, southM, columns: 14, rows: 9, kind: 'container' })),
  ),
  { westM: 1146, southM: -852, columns: 6, rows: 8, kind: 'reefer' },
  { westM: 1146, southM: -816, columns: 6, rows: 8, kind: 'reefer' },
  { westM: 1146, southM: -780, columns: 6, rows: 8, kind: 'reefer' },
  { westM: 1146, southM: -722, columns: 9, rows: 9, kind: 'container' },
  { westM: 1146, southM: -684, columns: 9, rows: 9, kind: 'container' },
];

/** Cranes that straddle a stack, by column and row of the yard and the share of the way along it. */
const YARD_CRANES: [column: number, row: number, share: number][] = [
  [0, 0, 0.3],
  [0, 3, 0.72],
  [1, 1, 0.5],
  [1, 4, 0.16],
  [2, 0, 0.82],
  [2, 2, 0.36],
  [3, 1, 0.2],
  [3, 5, 0.64],
];

const yardCranes: Point[][] = YARD_CRANES.map(([column, row, share]) => {
  const x = (STACK_COLUMNS_EAST_M[column] ?? 0) + share * 14 * 12.8;
  const y = STACK_ROWS_NORTH_M[row] ?? 0;
  return box(x - 5, y - 3, x + 5, y + 28);
});

/** A stack seen from above: containers end to end in rows, some places empty. */
function containersOf({ westM, southM, columns, rows, kind }: Stack, dice: Dice): MapFeature[] {
  const features: MapFeature[] = [];
  for (let row = 0; row < rows; row += 1) {
    for (let column = 0; column < columns; column += 1) {
      if (dice.chance(kind === 'reefer' ? 0.12 : 0.2)) continue;
      const x = westM + column * (CONTAINER.longM + 0.6);
      const y = southM + row * (CONTAINER.wideM + 0.35);
      const ring = box(x, y, x + CONTAINER.longM, y + CONTAINER.wideM);
      const tone = kind === 'reefer' ? 0 : 1 + Math.floor(dice.next() * 4);
      features.push(area('structures', { minzoom: 15 }, [ring], { class: 'container', tone }));
    }
  }
  return features;
}

const stackOutline = ({ westM, southM, columns, rows }: Stack) =>
  box(westM, southM, westM + columns * 12.8, southM + rows * 2.8);

const CRANES_EAST_M = [500, 640, 760, 905, 1080];

/** A quay crane from above: its legs on the rails, the two girders of its boom over the water, its trolley and house. */
function crane(eastM: number, trolleyNorthM: number): MapFeature[] {
  return [
    area('structures', { minzoom: 14 }, [box(eastM - 13, -613, eastM + 13, -578)], { class: 'crane-legs' }),
    ...[-4, 2.6].map((sideM) =>
      area('structures', { minzoom: 14 }, [box(eastM + sideM, -634, eastM + sideM + 1.6, -528)], {
        class: 'crane',
      }),
    ),
    ...[-634, -595, -560, -529.5].map((northM) =>
      area('structures', { minzoom: 15 }, [box(eastM - 4, northM, eastM + 4.2, northM + 1.5)], {
        class: 'crane',
      }),
    ),
    ...[trolleyNorthM, -624].map((northM) =>
      area('structures', { minzoom: 15 }, [box(eastM - 5, northM, eastM + 5, northM + 8)], {
        class: 'crane',
      }),
    ),
  ];
}

const breakwaterLine = smooth(
  [
    [1880, -1020],
    [2080, -930],
    [2300, -790],
    [2470, -610],
    [2560, -420],
    [2580, -330],
  ],
  16,
);

const breakwaters: Point[][] = [
  roughen(ribbon(breakwaterLine, 34), 3, 14, 71),
  roughen(
    ribbon(
      smooth(
        [
          [1452, -700],
          [1560, -690],
          [1660, -720],
          [1720, -790],
        ],
        12,
      ),
      18,
    ),
    2,
    12,
    73,
  ),
];

/** Floating landings of the boat basin. */
const pontoons: Point[][] = [0, 1, 2, 3].flatMap((index) => {
  const x = 1596 + index * 50;
  const fingers = [0, 1, 2, 3, 4, 5].map((finger) =>
    box(x - 12, -1000 + finger * 16, x + 15, -998.4 + finger * 16),
  );
  return [box(x, -1014, x + 3, -908), ...fingers];
});

const landings: Point[][] = [
  box(-1071, -394, -1062, -366),
  box(-1074, -368, -1040, -360),
  box(-716, 824, -712, 770),
  box(-730, 770, -698, 762),
  box(-560, -480, -552, -446),
  box(-860, -442, -852, -414),
];

/** Lighting masts of the container yard. */
const lamps: Point[][] = [552, 746, 940, 1138].flatMap((x) =>
  [-654, -730, -806, -882].map((y) => circle([x, y], 1.6, 8)),
);

const aprons: Point[][] = [
  box(-30, -640, 1450, -570),
  box(-190, -640, -6, -570),
  box(130, -930, 150, -632),
  box(-54, -930, -34, -632),
  [
    [1380, -640],
    [1450, -640],
    [1450, -862],
    [1430, -862],
  ],
];

/** Roads inside the fence. */
const yardRoads: { name: string; points: Point[] }[] = [
  {
    name: 'Long Quay Road',
    points: [
      [-150, -958],
      [-20, -954],
      [140, -952],
      [340, -944],
      [700, -936],
      [1142, -936],
      [1300, -920],
      [1388, -880],
      [1388, -720],
      [1400, -650],
    ],
  },
  {
    name: 'Shed Road',
    points: [
      [236, -948],
      [236, -650],
      [300, -634],
      [1340, -634],
    ],
  },
  {
    name: 'Silo Wharf',
    points: [
      [-160, -956],
      [-146, -900],
      [-146, -820],
      [-44, -800],
      [-44, -640],
    ],
  },
  {
    name: 'Depot Road',
    points: [
      [1150, -1085],
      [980, -1100],
      [760, -1100],
      [480, -1098],
      [200, -1092],
      [140, -1130],
      [150, -1230],
      [480, -1230],
      [780, -1232],
      [1060, -1230],
      [1186, -1236],
    ],
  },
];

export function portFeatures(): MapFeature[] {
  const dice = new Dice(7);
  return [
    ...aprons.map((ring) => area('structures', { minzoom: 13 }, [ring], { class: 'quay' })),
    ...stacks.map((stack) =>
      area('structures', { minzoom: 13 }, [stackOutline(stack)], {
        class: stack.kind === 'reefer' ? 'reefer-stack' : 'container-stack',
      }),
    ),
    ...stacks.flatMap((stack) => containersOf(stack, dice)),
    ...breakwaters.map((ring) => area('structures', { minzoom: 10 }, [ring], { class: 'breakwater' })),
    ...[...pontoons, ...landings].map((ring) =>
      area('structures', { minzoom: 14 }, [ring], { class: 'pier' }),
    ),
    ...[-581, -610].map((y) =>
      line(
        'structures',
        { minzoom: 14 },
        [
          [400, y],
          [1420, y],
        ],
        { class: 'crane-rail' },
      ),
    ),
    ...CRANES_EAST_M.flatMap((eastM, index) => crane(eastM, -545 - 17 * index)),
    ...yardCranes.map((ring) => area('structures', { minzoom: 15 }, [ring], { class: 'crane-legs' })),
    ...lamps.map((ring) => area('structures', { minzoom: 16 }, [ring], { class: 'pier' })),
    ...yardRoads.map(({ name, points }) =>
      line('roads', { minzoom: 14 }, points, { class: 'service', name }),
    ),
    ...bins.map((ring) => area('buildings', { minzoom: 14 }, [ring], { class: 'silo' })),
    line(
      'structures',
      { minzoom: 15 },
      [
        [-100, -628],
        [-100, -560],
        [-20, -560],
      ],
      { class: 'conveyor' },
    ),
    ...[320, 560, 820, 1080, 1340].map((x, index) =>
      spot('places', { minzoom: 15 }, [x, -556], { class: 'berth', name: `Berth ${index + 1}` }),
    ),
  ];
}
