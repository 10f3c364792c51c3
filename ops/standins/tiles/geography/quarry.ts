import { roughen, smoothRing } from './curves';
import { area, line, type MapFeature } from './feature';
import type { Point } from './plane';
import { blob, box, rectangle } from './shapes';

const MIDDLE: Point = [60, -2880];

/** Edges of the benches, from the rim of the pit down to its floor. */
const benches: Point[][] = [1, 0.83, 0.66, 0.47].map((share, index) => {
  const outer: Point[] = [
    [-330, -2860],
    [-270, -2680],
    [-110, -2600],
    [90, -2650],
    [260, -2700],
    [390, -2850],
    [390, -3010],
    [270, -3140],
    [60, -3190],
    [-180, -3150],
    [-310, -3030],
  ];
  const middle: Point = [MIDDLE[0] + index * 14, MIDDLE[1] - index * 16];
  const ring = outer.map(([x, y]): Point => [
    middle[0] + (x - MIDDLE[0]) * share,
    middle[1] + (y - MIDDLE[1]) * share,
  ]);
  return roughen(smoothRing(ring, 14), 9, 70, 81 + index);
});

const ramp: Point[] = [
  [180, -2620],
  [110, -2700],
  [-60, -2720],
  [-170, -2790],
  [-190, -2900],
  [-110, -2980],
  [20, -3000],
];

export const quarryBuildings: { ring: Point[]; kind: string; name?: string }[] = [
  { ring: rectangle([52, -2548], 34, 18, [0.9, -0.43]), kind: 'industrial', name: 'Crusher' },
  { ring: rectangle([-40, -2540], 22, 15, [0.95, 0.31]), kind: 'industrial' },
  { ring: rectangle([140, -2560], 16, 16, [0.9, -0.43]), kind: 'industrial' },
  { ring: rectangle([-250, -2700], 40, 16, [0.6, 0.8]), kind: 'industrial' },
];

export function quarryFeatures(): MapFeature[] {
  return [
    ...benches.map((ring, index) =>
      area('landuse', { minzoom: 12 }, [ring], { class: 'quarry-bench', step: index + 1 }),
    ),
    ...benches.map((ring) =>
      line('contours', { minzoom: 13 }, [...ring, ring[0] ?? MIDDLE], { class: 'quarry-edge' }),
    ),
    area('water', { minzoom: 12 }, [blob([170, -3000], 74, 46, 91)], { class: 'pond' }),
    ...[
      [205, -2560, 24],
      [245, -2610, 19],
      [-90, -2560, 17],
    ].map(([x = 0, y = 0, radius = 0], index) =>
      area('structures', { minzoom: 14 }, [blob([x, y], radius, radius * 0.85, 95 + index)], {
        class: 'stockpile',
      }),
    ),
    line(
      'structures',
      { minzoom: 14 },
      [
        [60, -2560],
        [150, -2556],
        [205, -2560],
      ],
      { class: 'conveyor' },
    ),
    line('roads', { minzoom: 14 }, ramp, { class: 'track', name: '' }),
    area('structures', { minzoom: 15 }, [box(-300, -2770, -276, -2766)], { class: 'platform' }),
  ];
}
