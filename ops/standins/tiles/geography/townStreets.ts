import { lerp, smooth, wander } from './curves';
import type { Point } from './plane';
import type { Road, RoadClass } from './roads';

/** A street of the town, with how it is built up. */
export interface Street extends Road {
  frontage: FrontageName;
}

/** Kinds of building along a street; `frontages.ts` says what each is. */
export type FrontageName = 'shops' | 'oldTown' | 'terrace' | 'pairs' | 'villas' | 'sheds' | 'farms' | 'none';

const street = (
  name: string,
  frontage: FrontageName,
  points: Point[],
  kind: RoadClass = 'street',
): Street => ({ name, frontage, kind, points: smooth(points, 15) });

const waterfront: Street[] = [
  street('Town Quay', 'shops', [
    [-1270, -402],
    [-1200, -412],
    [-1058, -441],
    [-900, -466],
    [-700, -496],
    [-470, -530],
    [-330, -556],
    [-214, -592],
  ]),
  street('Silo Lane', 'terrace', [
    [-210, -572],
    [-222, -650],
    [-230.5, -742],
    [-236, -840],
    [-244, -940],
  ]),
  street('Ropewalk', 'terrace', [
    [-2040, -836],
    [-1720, -846],
    [-1290, -858],
    [-900, -868],
    [-470, -884],
    [-366, -888],
  ]),
  street('Chapel Row', 'terrace', [
    [-2045, -1322],
    [-1900, -1329],
    [-1762, -1332],
    [-1600, -1338],
    [-1440, -1344],
  ]),
  street('Station Road', 'shops', [
    [-1420, -1352],
    [-1290, -1420],
    [-1150, -1472],
    [-1020, -1455],
    [-903, -1395],
  ]),
];

const oldTown: Street[] = [
  street('Ferry Lane', 'oldTown', [
    [-1064, -440],
    [-1072, -520],
    [-1052, -590],
    [-1060, -640],
  ]),
  street('Netloft Lane', 'oldTown', [
    [-1190, -414],
    [-1204, -500],
    [-1196, -580],
    [-1214, -652],
  ]),
  street('Customs Lane', 'oldTown', [
    [-940, -460],
    [-930, -540],
    [-944, -636],
  ]),
  street('Market Hill', 'shops', [
    [-812, -478],
    [-800, -556],
    [-806, -634],
  ]),
  street('Sailmaker Lane', 'oldTown', [
    [-690, -497],
    [-672, -570],
    [-684, -640],
  ]),
  street('Cooper Lane', 'oldTown', [
    [-566, -516],
    [-548, -590],
    [-560, -662],
  ]),
  street('Staithe Lane', 'oldTown', [
    [-440, -535],
    [-420, -620],
    [-452, -745],
  ]),
  street('Pump Lane', 'oldTown', [
    [-1196, -560],
    [-1130, -548],
    [-1070, -552],
  ]),
  street('Fish Street', 'oldTown', [
    [-1068, -540],
    [-930, -545],
    [-800, -556],
    [-676, -572],
    [-550, -592],
    [-424, -612],
    [-310, -640],
    [-224, -664],
  ]),
];

const betweenHighStreetAndRopewalk: Street[] = (
  [
    ['Weir Street', -1950, -758, -1960, -838],
    ['Tenter Street', -1800, -730, -1812, -843],
    ['Hemp Street', -1640, -702, -1650, -848],
    ['Bakehouse Lane', -1500, -683, -1512, -852],
    ['Library Street', -1370, -667, -1376, -856],
    ['Anchor Street', -1225, -653, -1230, -860],
    ['Lantern Street', -1090, -641, -1096, -864],
    ['Tanner Street', -960, -637, -962, -867],
    ['Tar Lane', -830, -634, -826, -870],
    ['Capstan Street', -690, -641, -684, -876],
    ['Lighterman Street', -566, -662, -556, -881],
    ['Maltings Lane', -470, -728, -464, -884],
  ] as const
).map(([name, fromX, fromY, toX, toY]) =>
  street(name, 'terrace', [
    [fromX, fromY],
    [(fromX + toX) / 2 + 5, (fromY + toY) / 2],
    [toX, toY],
  ]),
);

interface QuarterPlan {
  /** North-west, north-east, south-east, south-west corner. */
  corners: [Point, Point, Point, Point];
  /** Streets running east, as shares of the way south; and streets running south, as shares of the way east. */
  east: [name: string, share: number][];
  south: [name: string, share: number][];
  frontage: FrontageName;
  seed: number;
}

/** The streets of a quarter that was laid out as a grid and grew a little crooked. */
function quarter({ corners: [nw, ne, se, sw], east, south, frontage, seed }: QuarterPlan): Street[] {
  const at = (eastShare: number, southShare: number): Point => {
    const plain = lerp(lerp(nw, ne, eastShare), lerp(sw, se, eastShare), southShare);
    const inner = Math.min(1, 6 * Math.min(eastShare, 1 - eastShare, southShare, 1 - southShare));
    return wander(plain, 16 * inner, 260, seed);
  };
  const shares = Array.from({ length: 9 }, (_, index) => index / 8);
  return [
    ...east.map(([name, share]) =>
      street(
        name,
        frontage,
        shares.map((along) => at(along, share)),
      ),
    ),
    ...south.map(([name, share]) =>
      street(
        name,
        frontage,
        shares.map((along) => at(share, along)),
      ),
    ),
  ];
}

const quarters: Street[] = [
  quarter({
    corners: [
      [-1120, -864],
      [-366, -888],
      [-330, -1395],
      [-1130, -1400],
    ],
    east: [
      ['Hawser Street', 0.2],
      ['Bosun Street', 0.4],
      ['Lamp Street', 0.6],
      ['Coal Street', 0.8],
      ['Sidings Road', 1],
    ],
    south: [
      ['Mast Street', 0],
      ['Hallowstone Road', 0.285],
      ['Windlass Street', 0.52],
      ['Fender Street', 0.76],
      ['East Row', 1],
    ],
    frontage: 'terrace',
    seed: 301,
  }),
  quarter({
    corners: [
      [-2040, -836],
      [-1440, -855],
      [-1440, -1344],
      [-2045, -1322],
    ],
    east: [
      ['Reed Street', 0.24],
      ['Sluice Street', 0.47],
      ['Orchard Street', 0.72],
    ],
    south: [
      ['Westing Street', 0],
      ['Pound Street', 0.25],
      ['Chapel Street', 0.52],
      ['Plover Street', 0.76],
      ['School Street', 1],
    ],
    frontage: 'terrace',
    seed: 311,
  }),
  quarter({
    corners: [
      [-1440, -1060],
      [-1130, -1066],
      [-1130, -1400],
      [-1440, -1344],
    ],
    east: [
      ['Playfield Street', 0],
      ['Curlew Street', 0.36],
      ['Dunlin Street', 0.7],
    ],
    south: [['Teal Street', 0.5]],
    frontage: 'terrace',
    seed: 317,
  }),
].flat();

const westSuburb: Street[] = [
  street('Meadow Rise', 'pairs', [
    [-2270, -800],
    [-2300, -640],
    [-2420, -520],
    [-2600, -480],
    [-2760, -560],
    [-2790, -700],
    [-2760, -843],
  ]),
  street('Mallard Close', 'pairs', [
    [-2430, -518],
    [-2440, -640],
    [-2500, -730],
  ]),
  street('Heron Close', 'pairs', [
    [-2610, -480],
    [-2620, -620],
    [-2640, -730],
  ]),
  street('Long Acre', 'pairs', [
    [-2040, -836],
    [-2180, -960],
    [-2230, -1120],
    [-2210, -1300],
    [-2045, -1322],
  ]),
  street('Cressbed Road', 'pairs', [
    [-2420, -815],
    [-2400, -980],
    [-2440, -1160],
    [-2420, -1360],
    [-2300, -1480],
    [-2120, -1480],
    [-2045, -1322],
  ]),
  street('Sedge Avenue', 'pairs', [
    [-2640, -832],
    [-2620, -1000],
    [-2660, -1200],
    [-2640, -1400],
    [-2500, -1560],
    [-2300, -1600],
  ]),
  street('Rush Crescent', 'pairs', [
    [-2400, -980],
    [-2510, -960],
    [-2622, -1000],
  ]),
  street('Lapwing Road', 'pairs', [
    [-2232, -1120],
    [-2330, -1140],
    [-2440, -1160],
    [-2550, -1190],
    [-2660, -1200],
  ]),
  street('Kingfisher Way', 'pairs', [
    [-2212, -1300],
    [-2320, -1340],
    [-2424, -1350],
    [-2540, -1370],
    [-2644, -1380],
  ]),
  street('Sallow Road', 'villas', [
    [-2820, -851],
    [-2800, -1000],
    [-2830, -1180],
    [-2790, -1350],
    [-2640, -1390],
  ]),
];

const southSuburb: Street[] = [
  street('Signal Road', 'pairs', [
    [-880, -1650],
    [-1050, -1640],
    [-1300, -1660],
    [-1550, -1700],
    [-1780, -1780],
    [-1860, -1900],
    [-1800, -2020],
  ]),
  street('Fogman Road', 'pairs', [
    [-868, -1790],
    [-1060, -1780],
    [-1280, -1800],
    [-1480, -1850],
    [-1560, -1930],
    [-1540, -2011],
  ]),
  street('Lamplighter Way', 'pairs', [
    [-1060, -1641],
    [-1070, -1710],
    [-1062, -1780],
  ]),
  street('Platelayer Close', 'pairs', [
    [-1300, -1660],
    [-1300, -1730],
    [-1280, -1800],
  ]),
  street('Gantry Close', 'pairs', [
    [-1060, -1780],
    [-1080, -1850],
    [-1060, -1900],
  ]),
  street('Ballast Way', 'sheds', [
    [-862, -1730],
    [-600, -1700],
    [-280, -1670],
    [60, -1650],
    [420, -1640],
    [760, -1630],
    [900, -1680],
    [900, -1760],
  ]),
  street('Coupling Road', 'sheds', [
    [-300, -1850],
    [-290, -1760],
    [-280, -1670],
  ]),
  street('Trammel Road', 'sheds', [
    [420, -1805],
    [425, -1720],
    [420, -1640],
  ]),
];

export const townStreets: Street[] = [
  ...waterfront,
  ...oldTown,
  ...betweenHighStreetAndRopewalk,
  ...quarters,
  ...westSuburb,
  ...southSuburb,
];

export const villageStreets: Street[] = [
  street('Hard Lane', 'oldTown', [
    [-760, 846],
    [-735, 980],
    [-660, 1150],
    [-600, 1290],
    [-560, 1430],
  ]),
  street('Wharfinger Lane', 'oldTown', [
    [-735, 980],
    [-880, 1010],
    [-1010, 1090],
    [-1050, 1305],
  ]),
  street('Osier Close', 'pairs', [
    [-600, 1290],
    [-480, 1260],
    [-400, 1300],
    [-380, 1400],
    [-440, 1486],
  ]),
  street('Withy Bank', 'villas', [
    [-1010, 1090],
    [-1180, 1060],
    [-1380, 1110],
  ]),
  street('Hallowstone Green', 'oldTown', [
    [-1080, -2700],
    [-1240, -2740],
    [-1330, -2850],
    [-1270, -2950],
    [-1160, -2925],
  ]),
  street('Stonecutter Lane', 'pairs', [
    [-1330, -2850],
    [-1470, -2840],
    [-1600, -2870],
    [-1640, -2955],
  ]),
  street('Kiln Lane', 'pairs', [
    [-1150, -2900],
    [-1010, -2960],
    [-880, -2950],
    [-800, -2790],
  ]),
  street('Ness Green', 'oldTown', [
    [2480, -2330],
    [2580, -2260],
    [2700, -2300],
    [2740, -2440],
    [2640, -2560],
  ]),
  street('Coastguard Row', 'terrace', [
    [3020, -1900],
    [3130, -1930],
    [3220, -2000],
  ]),
  street('Dune Road', 'villas', [
    [3010, 2330],
    [3150, 2380],
    [3230, 2520],
    [3220, 2740],
    [3062, 2800],
  ]),
  street('Marram Close', 'pairs', [
    [2880, 2030],
    [2750, 2120],
    [2760, 2290],
    [2860, 2400],
    [3020, 2420],
  ]),
];
