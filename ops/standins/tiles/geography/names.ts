import { line, spot, type MapFeature } from './feature';
import { markedPoints } from './landmarks';
import type { Point } from './plane';
import { woodNames } from './woods';
import { smooth } from './curves';

const settlements: { class: string; name: string; at: Point; minzoom: number }[] = [
  { class: 'island', name: 'Isle of Harn', at: [-25000, -1500], minzoom: 6 },
  { class: 'city', name: 'Merrow', at: [-1250, -740], minzoom: 6 },
  { class: 'village', name: 'Osier Hythe', at: [-640, 1240], minzoom: 11 },
  { class: 'village', name: 'Hallowstone', at: [-1250, -2850], minzoom: 11 },
  { class: 'village', name: 'Sandrel', at: [3020, 2480], minzoom: 11 },
  { class: 'hamlet', name: 'Ness Green', at: [2620, -2400], minzoom: 12 },
  { class: 'quarter', name: 'Old Town', at: [-930, -590], minzoom: 14 },
  { class: 'quarter', name: 'Ropewalk', at: [-1560, -920], minzoom: 14 },
  { class: 'quarter', name: 'Chapel Side', at: [-1740, -1090], minzoom: 14 },
  { class: 'quarter', name: 'Coal Row', at: [-690, -1095], minzoom: 14 },
  { class: 'quarter', name: 'Meadowside', at: [-2470, -640], minzoom: 14 },
  { class: 'quarter', name: 'Cressbed', at: [-2480, -1120], minzoom: 14 },
  { class: 'quarter', name: 'Signal Hill', at: [-1400, -1790], minzoom: 14 },
  { class: 'area', name: 'Long Quay', at: [900, -655], minzoom: 14 },
  { class: 'area', name: 'Grain Dock', at: [48, -780], minzoom: 14 },
  { class: 'area', name: 'Port of Merrow', at: [690, -930], minzoom: 12 },
  { class: 'area', name: 'Merrow Yard', at: [240, -1532], minzoom: 13 },
  { class: 'area', name: 'Hallowstone Quarry', at: [40, -2960], minzoom: 12 },
  { class: 'area', name: 'Ballast Way Works', at: [100, -1715], minzoom: 14 },
  { class: 'area', name: 'Pilot Basin', at: [1660, -880], minzoom: 14 },
  { class: 'green', name: 'Merrow Marsh', at: [1250, 1180], minzoom: 11 },
  { class: 'green', name: 'Hythe Level', at: [900, 1640], minzoom: 13 },
  { class: 'green', name: 'Great Cob', at: [1620, 335], minzoom: 12 },
  { class: 'green', name: 'Little Cob', at: [700, 318], minzoom: 13 },
  { class: 'green', name: 'Heron Spit', at: [3310, 640], minzoom: 12 },
  { class: 'green', name: 'Cold Ness', at: [3270, -1990], minzoom: 12 },
  { class: 'green', name: 'Long Meadow', at: [-1890, -400], minzoom: 14 },
  { class: 'green', name: 'Ballast Park', at: [-1868, -905], minzoom: 15 },
  { class: 'green', name: 'Allotments', at: [-1820, -1480], minzoom: 15 },
  { class: 'green', name: 'Playing field', at: [-1203, -1000], minzoom: 15 },
  { class: 'area', name: 'Sandrel Dunes holiday park', at: [3190, 3240], minzoom: 14 },
  { class: 'water', name: 'North Swatch', at: [1050, 655], minzoom: 12 },
  { class: 'water', name: 'Cold Bay', at: [2760, -1230], minzoom: 11 },
  { class: 'water', name: 'Merrow Road', at: [4300, -700], minzoom: 11 },
  { class: 'water', name: 'Hythe Creek', at: [-560, 640], minzoom: 14 },
  { class: 'water', name: 'Cob Flats', at: [620, 110], minzoom: 12 },
  { class: 'water', name: 'Swatch Mud', at: [-480, 620], minzoom: 13 },
  { class: 'sea', name: 'Harn Sound', at: [9500, 3500], minzoom: 7 },
];

/** Lines along which the names of waters are set. */
const waterLines: { name: string; points: Point[]; minzoom: number }[] = [
  {
    name: 'River Merrow',
    minzoom: 12,
    points: [
      [-4700, 770],
      [-4200, 520],
      [-3700, 260],
      [-3250, 320],
      [-2850, 420],
      [-2480, 270],
      [-2180, 160],
      [-1850, 90],
    ],
  },
  {
    name: 'Merrow Estuary',
    minzoom: 11,
    points: [
      [-1300, -130],
      [-600, -270],
      [200, -390],
      [1200, -400],
      [2200, -300],
    ],
  },
];

const ferry: Point[] = smooth(
  [
    [-1066, -362],
    [-1060, -180],
    [-980, 200],
    [-820, 560],
    [-714, 764],
  ],
  30,
);

export function nameFeatures(): MapFeature[] {
  return [
    ...settlements.map(({ class: kind, name, at, minzoom }) =>
      spot('places', { minzoom }, at, { class: kind, name }),
    ),
    ...woodNames.map(({ name, at }) => spot('places', { minzoom: 13 }, at, { class: 'green', name })),
    ...waterLines.map(({ name, points, minzoom }) =>
      line('places', { minzoom }, smooth(points, 40), { class: 'water-line', name }),
    ),
    ...markedPoints.map(({ class: kind, name, point, minzoom }) =>
      spot('poi', { minzoom }, point, { class: kind, name }),
    ),
    line('roads', { minzoom: 12 }, ferry, { class: 'ferry', name: 'Merrow–Hythe ferry' }),
  ];
}
