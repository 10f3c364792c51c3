import { blob, isInside } from './shapes';
import type { Point } from './plane';
import { noiseAt } from './random';

const named: { name: string; at: Point; eastM: number; northM: number }[] = [
  { name: 'Hollow Wood', at: [-650, -2480], eastM: 250, northM: 150 },
  { name: 'Quarry Hanger', at: [720, -2980], eastM: 170, northM: 300 },
  { name: 'Combe Wood', at: [-3050, -2450], eastM: 330, northM: 230 },
  { name: 'Ravens’ Copse', at: [1500, -2500], eastM: 220, northM: 160 },
  { name: 'Monks’ Wood', at: [-1900, 2420], eastM: 380, northM: 260 },
  { name: 'Osier Carr', at: [-1250, 1560], eastM: 230, northM: 120 },
  { name: 'Staithe Wood', at: [900, 2380], eastM: 210, northM: 250 },
  { name: 'Northdown Wood', at: [-200, 3350], eastM: 460, northM: 260 },
  { name: 'Beacon Plantation', at: [-4300, -1900], eastM: 300, northM: 420 },
  { name: 'Weir Wood', at: [-4050, 900], eastM: 290, northM: 170 },
  { name: 'Ness Covert', at: [2300, -2900], eastM: 150, northM: 220 },
  { name: 'Long Covert', at: [-2080, -2480], eastM: 260, northM: 90 },
  { name: 'Sandrel Wood', at: [2420, 2420], eastM: 180, northM: 220 },
];

const outlines = named.map(({ at, eastM, northM }, index) => blob(at, eastM, northM, 231 + index * 11));

/**
 * Whether a parcel of land is wooded: inside a named wood always, elsewhere now and then, more often on high ground.
 * @param draw a random number, 0 ≤ draw < 1
 */
export function isWooded(middle: Point, draw: number): boolean {
  if (outlines.some((ring) => isInside(middle, ring))) return true;
  const clump = noiseAt(middle, 700, 57, 2);
  const upland = noiseAt(middle, 3800, 59, 2);
  return clump + 0.5 * upland > 0.62 || draw < 0.012;
}

export const woodNames = named.map(({ name, at }) => ({ name, at }));
