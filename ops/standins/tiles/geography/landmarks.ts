import { SOURCE_POINTS } from '../sites';
import type { Point } from './plane';
import { portBuildings } from './port';
import { quarryBuildings } from './quarry';
import { box, circle, rectangle } from './shapes';

export interface Landmark {
  ring: Point[];
  kind: string;
  name?: string;
}

/** A church from above: nave, transepts, tower. */
function church([x, y]: Point, sizeM: number): Point[] {
  const s = sizeM / 10;
  return (
    [
      [-6, -2],
      [-1, -2],
      [-1, -4],
      [2, -4],
      [2, -2],
      [6, -2],
      [6, 2],
      [2, 2],
      [2, 4],
      [-1, 4],
      [-1, 2],
      [-6, 2],
    ] as const
  ).map(([a, b]): Point => [x + a * s, y + b * s]);
}

const [schoolX, schoolY] = SOURCE_POINTS.school;

/** Ropewalk School: a hall with two wings about the playground. */
const school: Landmark[] = [
  {
    kind: 'school',
    name: 'Ropewalk School',
    ring: [
      [schoolX - 88, schoolY + 62],
      [schoolX - 10, schoolY + 60],
      [schoolX - 10, schoolY + 42],
      [schoolX - 70, schoolY + 44],
      [schoolX - 70, schoolY - 10],
      [schoolX - 28, schoolY - 10],
      [schoolX - 28, schoolY - 28],
      [schoolX - 70, schoolY - 28],
      [schoolX - 70, schoolY - 50],
      [schoolX - 88, schoolY - 50],
    ],
  },
  { kind: 'school', ring: box(schoolX - 118, schoolY + 20, schoolX - 98, schoolY + 46) },
  { kind: 'school', ring: box(schoolX - 118, schoolY - 62, schoolX - 98, schoolY - 30) },
];

const town: Landmark[] = [
  { kind: 'chapel', name: 'Salters’ Chapel', ring: church(SOURCE_POINTS.chapel, 30) },
  { kind: 'chapel', name: 'Mariners’ Church', ring: church([-742, -598], 42) },
  { kind: 'civic', name: 'Market Hall', ring: rectangle([-848, -600], 24, 16, [0.02, 1]) },
  { kind: 'civic', name: 'Merrow Town station', ring: box(-1196, -1524, -1132, -1510) },
  { kind: 'civic', name: 'Ferry office', ring: box(-1098, -426, -1078, -416) },
  { kind: 'chapel', ring: church([-520, 1372], 30) },
  { kind: 'chapel', ring: church([-1196, -2812], 28) },
  { kind: 'industrial', ring: box(310, -1588, 420, -1570), name: 'Engine shed' },
  { kind: 'industrial', ring: rectangle([-2470, -300], 30, 14, [0.93, 0.37]) },
  { kind: 'civic', name: 'Boathouse', ring: rectangle([-1395, -328], 30, 12, [0.86, -0.5]) },
  { kind: 'civic', name: 'Heron Light', ring: circle([3700, 318], 6, 16) },
  { kind: 'civic', ring: box(3672, 322, 3688, 332) },
  { kind: 'civic', name: 'Marsh Hide', ring: rectangle([1092, 1364], 9, 5, [0.99, 0.08]) },
  { kind: 'civic', name: 'Coastguard lookout', ring: box(3318, -1822, 3330, -1812) },
];

/** Three long malting floors and a kiln. */
const maltings: Landmark[] = [
  { kind: 'industrial', name: 'The Maltings', ring: rectangle([-318, -724], 84, 15, [0.98, -0.2]) },
  { kind: 'industrial', ring: rectangle([-316, -752], 88, 15, [0.98, -0.2]) },
  { kind: 'industrial', ring: rectangle([-304, -780], 60, 14, [0.98, -0.2]) },
  { kind: 'industrial', ring: rectangle([-292, -812], 18, 18, [0.98, -0.2]) },
];

const tanks: Landmark[] = [
  [-2590, -360],
  [-2555, -345],
  [-2520, -330],
  [-2600, -325],
  [-2565, -310],
].map(([x = 0, y = 0]) => ({ kind: 'industrial', ring: circle([x, y], 13, 20) }));

/** Caravans of the holiday park, in rows. */
const caravans: Landmark[] = Array.from({ length: 84 }, (_, index) => {
  const [row, column] = [Math.floor(index / 7), index % 7];
  const skewed: Point = [3112 + column * 23 - row * 0.5, 3072 + row * 28];
  return { kind: 'house', ring: rectangle(skewed, 11, 4.2, [0.94, 0.34]) };
});

/** Buildings that were placed one by one, before any street is built up. */
export const landmarks: Landmark[] = [
  ...school,
  ...town,
  ...maltings,
  ...tanks,
  ...caravans,
  ...portBuildings,
  ...quarryBuildings,
];

export const markedPoints: {
  class: string;
  name: string;
  point: Point;
  minzoom: number;
}[] = [
  { class: 'lighthouse', name: 'Heron Light', point: [3700, 318], minzoom: 10 },
  { class: 'school', name: 'Ropewalk School', point: SOURCE_POINTS.school, minzoom: 14 },
  { class: 'chapel', name: 'Salters’ Chapel', point: SOURCE_POINTS.chapel, minzoom: 14 },
  { class: 'chapel', name: 'Mariners’ Church', point: [-742, -598], minzoom: 14 },
  { class: 'station', name: 'Merrow Town', point: [-1160, -1542], minzoom: 13 },
  { class: 'ferry', name: 'Ferry Steps', point: SOURCE_POINTS.ferrySteps, minzoom: 14 },
  { class: 'ferry', name: 'Hythe Hard', point: [-714, 800], minzoom: 14 },
  { class: 'hide', name: 'Marsh hide', point: [1092, 1364], minzoom: 14 },
  { class: 'silo', name: 'Grain silo', point: SOURCE_POINTS.siloFan, minzoom: 15 },
  { class: 'works', name: 'Crusher', point: [52, -2548], minzoom: 15 },
  { class: 'works', name: 'Water works', point: [-2520, -350], minzoom: 15 },
  { class: 'lookout', name: 'Coastguard lookout', point: [3324, -1817], minzoom: 14 },
  { class: 'civic', name: 'Market Hall', point: [-848, -600], minzoom: 15 },
];
