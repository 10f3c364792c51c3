import { roughen, smooth } from './curves';
import { area, line, spot, type MapFeature } from './feature';
import type { Point } from './plane';
import { outerRoads, ROAD_MINZOOM } from './roads';
import { blob } from './shapes';

interface Town {
  name: string;
  at: Point;
  radiusM: number;
  minzoom: number;
}

/** The island's other towns and villages, drawn for the small zooms only. */
const towns: Town[] = [
  { name: 'Varrow', at: [-16000, -3000], radiusM: 1300, minzoom: 8 },
  { name: 'Oxmere', at: [-24000, 8000], radiusM: 1000, minzoom: 8 },
  { name: 'Tilhythe', at: [-36300, -10400], radiusM: 1300, minzoom: 7 },
  { name: 'Garsand', at: [-9000, 16900], radiusM: 800, minzoom: 8 },
  { name: 'Pennock', at: [-12000, -18400], radiusM: 750, minzoom: 8 },
  { name: 'Kelderhaven', at: [-36000, 15000], radiusM: 700, minzoom: 9 },
  { name: 'Stanmoor', at: [-29000, -6000], radiusM: 420, minzoom: 10 },
  { name: 'Thornwick Cross', at: [-3000, -11000], radiusM: 380, minzoom: 10 },
  { name: 'Upper Garth', at: [-4500, 12500], radiusM: 380, minzoom: 10 },
  { name: 'Withyford', at: [-6500, -1120], radiusM: 230, minzoom: 11 },
  { name: 'Brackenby', at: [-1800, 5000], radiusM: 230, minzoom: 11 },
  { name: 'Low Combe', at: [-1300, -4900], radiusM: 220, minzoom: 11 },
];

const rivers: { name: string; points: Point[]; minzoom: number }[] = [
  {
    name: 'Merrow',
    minzoom: 8,
    points: [
      [-9480, 2295],
      [-11000, 2900],
      [-14000, 2500],
      [-17500, 4300],
      [-20500, 6200],
      [-23300, 9300],
    ],
  },
  {
    name: 'Varrow Water',
    minzoom: 9,
    points: [
      [-14000, 2500],
      [-15000, 200],
      [-15800, -3600],
      [-18500, -8200],
      [-18000, -12500],
    ],
  },
  {
    name: 'Till',
    minzoom: 9,
    points: [
      [-37000, -9700],
      [-35500, -6000],
      [-32500, -1500],
      [-30500, 2500],
    ],
  },
  {
    name: 'Garth Brook',
    minzoom: 10,
    points: [
      [-9000, 17700],
      [-9300, 15800],
      [-10500, 12000],
      [-12000, 8500],
    ],
  },
  {
    name: 'Combe Brook',
    minzoom: 12,
    points: [
      [-3720, 230],
      [-3850, -350],
      [-4180, -1200],
      [-4080, -2300],
      [-4400, -3600],
      [-5400, -4700],
    ],
  },
];

export function hinterlandFeatures(): MapFeature[] {
  return [
    ...towns.map(({ at, radiusM, minzoom }, index) =>
      area('landuse', { minzoom }, [blob(at, radiusM, radiusM * 0.8, 1301 + index * 5)], {
        class: 'residential',
      }),
    ),
    area('water', { minzoom: 8 }, [blob([-24600, 10_400], 1500, 800, 1401)], {
      class: 'lake',
      name: 'Ox Mere',
    }),
    ...rivers.map(({ name, points, minzoom }) =>
      line('water', { minzoom }, roughen(roughen(smooth(points, 30), 260, 900, 1501), 55, 190, 1503), {
        class: 'river',
        name,
      }),
    ),
    ...outerRoads.map(({ kind, name, points }) =>
      line('roads', { minzoom: ROAD_MINZOOM[kind] }, points, { class: kind, name }),
    ),
    ...towns.map(({ name, at, radiusM, minzoom }) =>
      spot('places', { minzoom }, at, { class: radiusM > 600 ? 'town' : 'village', name }),
    ),
  ];
}
