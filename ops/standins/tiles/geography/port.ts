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

const stackColumns = [372, 568, 764, 960];
const stacks: Stack[] = [
  ...stackColumns
    .flatMap((westM) =>
      [-690, -735, -780, -825, -870].map((southM): Stack => ({
        westM,
        southM,
        columns: 13,
        rows: 11,
        kind: 'container',
      })),
    )
    .filter(({ westM, southM }) => !(westM === 960 && southM < -870)),
  { westM: 1150, southM: -846, columns: 6, rows: 9, kind: 'reefer' },
  { westM: 1150, southM: -800, columns: 6, rows: 9, kind: 'reefer' },
  { westM: 1150, southM: -706, columns: 8, rows: 8, kind: 'container' },
];

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

/** A quay crane from above: its legs on the rails, its boom over the water. */
function crane(eastM: number): MapFeature[] {
  return [
    area('structures', { minzoom: 14 }, [box(eastM - 13, -613, eastM + 13, -578)], { class: 'crane-legs' }),
    area('structures', { minzoom: 14 }, [box(eastM - 3.2, -640, eastM + 3.2, -525)], { class: 'crane' }),
    area('structures', { minzoom: 15 }, [box(eastM - 7, -620, eastM + 7, -606)], { class: 'crane' }),
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
    ...[-582, -609].map((y) =>
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
    ...CRANES_EAST_M.flatMap(crane),
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
