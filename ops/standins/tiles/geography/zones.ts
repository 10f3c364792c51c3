import { smoothRing } from './curves';
import type { Point } from './plane';
import { box } from './shapes';

/** Large areas of one use. Fields keep out of all of them; streets' houses keep out of those that are `isReserved`. */
export interface Zone {
  kind:
    | 'residential'
    | 'port'
    | 'industrial'
    | 'railway'
    | 'quarry'
    | 'school'
    | 'park'
    | 'churchyard'
    | 'allotments'
    | 'pitch'
    | 'heath'
    | 'holiday'
    | 'works'
    | 'playground'
    | 'scrub';
  name?: string;
  ring: Point[];
  isReserved: boolean;
}

const round = (points: Point[]) => smoothRing(points, 40);

const town: Zone[] = [
  {
    kind: 'residential',
    isReserved: false,
    ring: [
      [-2890, -880],
      [-2850, -560],
      [-2700, -420],
      [-2420, -430],
      [-2230, -560],
      [-2140, -740],
      [-1900, -640],
      [-1500, -540],
      [-1330, -420],
      [-1262, -354],
      [-1078, -403],
      [-700, -462],
      [-300, -522],
      [-206, -566],
      [-206, -960],
      [-250, -1400],
      [-880, -1420],
      [-1000, -1490],
      [-1300, -1480],
      [-1500, -1420],
      [-2060, -1390],
      [-2200, -1560],
      [-2360, -1690],
      [-2560, -1640],
      [-2720, -1470],
      [-2900, -1330],
    ],
  },
  {
    kind: 'residential',
    isReserved: false,
    ring: [
      [-840, -1600],
      [-1080, -1595],
      [-1350, -1615],
      [-1640, -1665],
      [-1900, -1800],
      [-1890, -1990],
      [-1500, -1992],
      [-865, -1908],
    ],
  },
];

const villages: Zone[] = [
  {
    kind: 'residential',
    isReserved: false,
    ring: round([
      [-860, 835],
      [-690, 870],
      [-600, 1080],
      [-340, 1230],
      [-320, 1480],
      [-560, 1540],
      [-900, 1400],
      [-1120, 1300],
      [-1420, 1160],
      [-1380, 1030],
      [-1060, 990],
    ]),
  },
  {
    kind: 'residential',
    isReserved: false,
    ring: round([
      [-1020, -2640],
      [-1260, -2680],
      [-1480, -2790],
      [-1700, -2860],
      [-1690, -3000],
      [-1360, -3010],
      [-1080, -3060],
      [-820, -3000],
      [-760, -2780],
    ]),
  },
  {
    kind: 'residential',
    isReserved: false,
    ring: round([
      [2420, -2290],
      [2580, -2200],
      [2770, -2270],
      [2800, -2470],
      [2650, -2620],
      [2480, -2480],
    ]),
  },
  {
    kind: 'residential',
    isReserved: false,
    ring: round([
      [2700, 2060],
      [2900, 1980],
      [3090, 2260],
      [3270, 2420],
      [3280, 2800],
      [3060, 2860],
      [2960, 2500],
      [2720, 2330],
    ]),
  },
  {
    kind: 'holiday',
    name: 'Sandrel Dunes holiday park',
    isReserved: true,
    ring: [
      [3090, 3020],
      [3300, 3060],
      [3280, 3420],
      [3090, 3440],
      [3060, 3220],
    ],
  },
];

const work: Zone[] = [
  {
    kind: 'port',
    name: 'Port of Merrow',
    isReserved: true,
    ring: [
      [-205, -566],
      [-190, -570],
      [1450, -570],
      [1450, -862],
      [1486, -900],
      [1470, -985],
      [1560, -1060],
      [1600, -1200],
      [1500, -1330],
      [1250, -1400],
      [120, -1400],
      [60, -1180],
      [-90, -1130],
      [-205, -1000],
    ],
  },
  {
    kind: 'railway',
    name: 'Merrow Yard',
    isReserved: true,
    ring: [
      [-880, -1450],
      [-560, -1450],
      [-200, -1424],
      [960, -1404],
      [1190, -1424],
      [1190, -1486],
      [980, -1560],
      [-180, -1604],
      [-560, -1560],
      [-880, -1560],
      [-1420, -1580],
      [-1420, -1520],
    ],
  },
  {
    kind: 'industrial',
    isReserved: false,
    ring: [
      [-820, -1600],
      [-560, -1578],
      [-180, -1616],
      [980, -1575],
      [1150, -1560],
      [1190, -1660],
      [900, -1745],
      [312, -1800],
      [-300, -1838],
      [-830, -1905],
    ],
  },
  {
    kind: 'quarry',
    name: 'Hallowstone Quarry',
    isReserved: true,
    ring: round([
      [-400, -2760],
      [-330, -2560],
      [-120, -2470],
      [120, -2480],
      [300, -2560],
      [470, -2720],
      [500, -2960],
      [380, -3160],
      [140, -3270],
      [-140, -3240],
      [-340, -3100],
      [-420, -2930],
    ]),
  },
  {
    kind: 'works',
    name: 'Water works',
    isReserved: true,
    ring: [
      [-2660, -330],
      [-2430, -240],
      [-2370, -370],
      [-2600, -445],
    ],
  },
];

const green: Zone[] = [
  {
    kind: 'scrub',
    isReserved: true,
    ring: [
      [-244, -1000],
      [-205, -1000],
      [-90, -1130],
      [60, -1180],
      [120, -1400],
      [-200, -1424],
      [-300, -1410],
      [-318, -1180],
    ],
  },
  {
    kind: 'scrub',
    isReserved: true,
    ring: [
      [1190, -1424],
      [1500, -1330],
      [1600, -1200],
      [1560, -1060],
      [1640, -1050],
      [1820, -1080],
      [1820, -1330],
      [1560, -1462],
      [1190, -1540],
    ],
  },
  {
    kind: 'industrial',
    name: 'The Maltings',
    isReserved: true,
    ring: [
      [-372, -690],
      [-262, -712],
      [-268, -840],
      [-318, -852],
      [-398, -742],
    ],
  },
  {
    kind: 'school',
    name: 'Ropewalk School',
    isReserved: true,
    ring: [
      [-1422, -866],
      [-1142, -872],
      [-1140, -1046],
      [-1426, -1040],
    ],
  },
  {
    kind: 'churchyard',
    isReserved: true,
    ring: [
      [-1886, -1258],
      [-1790, -1256],
      [-1786, -1322],
      [-1884, -1318],
    ],
  },
  {
    kind: 'churchyard',
    isReserved: true,
    ring: [
      [-782, -566],
      [-700, -574],
      [-704, -628],
      [-784, -624],
    ],
  },
  {
    kind: 'park',
    name: 'Ballast Park',
    isReserved: true,
    ring: [
      [-1940, -866],
      [-1800, -866],
      [-1790, -950],
      [-1850, -968],
      [-1936, -950],
    ],
  },
  {
    kind: 'park',
    name: 'Long Meadow',
    isReserved: true,
    ring: round([
      [-2230, -20],
      [-1960, -130],
      [-1700, -250],
      [-1480, -360],
      [-1400, -470],
      [-1560, -560],
      [-1900, -640],
      [-2100, -640],
      [-2240, -480],
      [-2340, -240],
    ]),
  },
  {
    kind: 'allotments',
    name: 'Allotments',
    isReserved: true,
    ring: [
      [-2120, -1420],
      [-2020, -1400],
      [-1560, -1436],
      [-1560, -1520],
      [-1930, -1550],
      [-2090, -1600],
    ],
  },
  { kind: 'playground', isReserved: true, ring: box(-1360, -1000, -1262, -912) },
  { kind: 'pitch', isReserved: true, ring: box(-1254, -1034, -1152, -960) },
  { kind: 'pitch', isReserved: true, ring: box(-2080, -580, -1975, -515) },
  { kind: 'pitch', isReserved: true, ring: box(-1945, -560, -1840, -495) },
  {
    kind: 'heath',
    name: 'Cold Ness',
    isReserved: false,
    ring: round([
      [2900, -1640],
      [3090, -1660],
      [3360, -1750],
      [3480, -1960],
      [3380, -2280],
      [3260, -2650],
      [3080, -2560],
      [3120, -2200],
      [2960, -1920],
    ]),
  },
];

export const zones: Zone[] = [...town, ...villages, ...work, ...green];
