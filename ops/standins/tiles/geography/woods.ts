import { distanceM } from './curves';
import { area, type MapFeature } from './feature';
import { districtMask, isLand } from './ground';
import type { Point } from './plane';
import { Dice, noiseAt } from './random';
import { blob, isInside } from './shapes';
import { mainland } from './shore';
import { zones } from './zones';

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

const namedWoods = named.map(({ at, eastM, northM }, index) => blob(at, eastM, northM, 231 + index * 11));

/** Small copses, and larger woods further off. */
function scattered(): Point[][] {
  const dice = new Dice(44);
  const centres = Array.from({ length: 150 }, (): Point => [
    dice.between(-10_500, 3800),
    dice.between(-6200, 6700),
  ]);
  return centres
    .filter((at) => noiseAt(at, 2600, 57) > -0.25)
    .map((at, index) => {
      const sizeM = dice.between(45, 110) + 0.016 * distanceM(at, [-600, -300]);
      return blob(at, sizeM * dice.between(0.9, 1.7), sizeM, 911 + index * 13);
    })
    .filter((ring) => ring.every(isLand))
    .filter((ring) => !ring.some(isInZone));
}

const isInZone = districtMask(zones.map(({ ring }) => [ring]));

const copses = scattered();

/** Woods of the detailed map. */
export const woods: Point[][] = [...namedWoods, ...copses];

/** Woods of the rest of the island, for the small zooms. */
function farWoods(): Point[][] {
  const dice = new Dice(45);
  return Array.from({ length: 260 }, (): Point => [
    dice.between(-44_000, 2000),
    dice.between(-21_000, 23_000),
  ])
    .filter((at) => !(at[0] > -11_500 && at[1] > -7200 && at[1] < 7600) && noiseAt(at, 9000, 59) > -0.05)
    .map((at, index) => blob(at, dice.between(350, 1300), dice.between(300, 900), 3001 + index * 17))
    .filter((ring) => ring.every((point, corner) => corner % 6 > 0 || isInside(point, mainland)));
}

export const woodNames = named.map(({ name, at }) => ({ name, at }));

export function woodFeatures(): MapFeature[] {
  return [
    ...farWoods().map((ring) => area('landuse', { minzoom: 8 }, [ring], { class: 'wood' })),
    ...namedWoods.map((ring) => area('landuse', { minzoom: 10 }, [ring], { class: 'wood' })),
    ...copses.map((ring) => area('landuse', { minzoom: 11 }, [ring], { class: 'wood' })),
  ];
}
