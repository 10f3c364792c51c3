import { distanceM, lerp } from './curves';
import { area, type MapFeature } from './feature';
import { parcels } from './fields';
import type { BuildingGround } from './ground';
import type { Point } from './plane';
import { Dice } from './random';
import { box, circle, isInside, ringAreaM2 } from './shapes';
import { zones } from './zones';

/** Single trees are drawn this far from the middle of the map. */
const REACH_M = 4600;
const MIDDLE: Point = [-300, -300];

const tree = ([x, y]: Point, radiusM: number, kind: 'tree' | 'canopy') =>
  area('landuse', { minzoom: 15 }, [circle([x, y], radiusM, 8)], { class: kind });

function randomIn(ring: readonly Point[], count: number, dice: Dice): Point[] {
  const xs = ring.map(([x]) => x);
  const ys = ring.map(([, y]) => y);
  return Array.from({ length: count }, (): Point => [
    dice.between(Math.min(...xs), Math.max(...xs)),
    dice.between(Math.min(...ys), Math.max(...ys)),
  ]).filter((point) => isInside(point, ring));
}

const countFor = (ring: readonly Point[], perHectare: number) =>
  Math.round((Math.abs(ringAreaM2(ring)) / 10_000) * perHectare);

/** Trees in gardens and on the edges of the town, wherever nothing is built. */
function gardenTrees(ground: BuildingGround, dice: Dice): MapFeature[] {
  return zones
    .filter(({ kind }) => kind === 'residential')
    .flatMap(({ ring }) => randomIn(ring, countFor(ring, 22), dice))
    .filter(([x, y]) => ground.claim(box(x - 3, y - 3, x + 3, y + 3)))
    .map((point) => tree(point, dice.between(1.8, 3.8), 'tree'));
}

const TREES_PER_HECTARE = { park: 14, churchyard: 40, school: 5, allotments: 4, heath: 1.2 } as const;

function parkTrees(dice: Dice): MapFeature[] {
  return zones.flatMap(({ kind, ring }) => {
    const perHectare =
      kind in TREES_PER_HECTARE ? TREES_PER_HECTARE[kind as keyof typeof TREES_PER_HECTARE] : 0;
    return randomIn(ring, countFor(ring, perHectare), dice)
      .filter(
        (point) => !zones.some(({ kind: other, ring: pitch }) => other === 'pitch' && isInside(point, pitch)),
      )
      .map((point) => tree(point, dice.between(2.4, 5), 'tree'));
  });
}

function hedgeTrees(ring: readonly Point[], dice: Dice): MapFeature[] {
  return ring.flatMap((corner, index) => {
    if (!dice.chance(0.16)) return [];
    const at = lerp(corner, ring[(index + 1) % ring.length] ?? corner, dice.next());
    return [tree(at, dice.between(2.2, 4.6), 'tree')];
  });
}

/** Trees of the gardens, parks, hedges and woods about the town; the woods' as a texture of crowns. */
export function treeFeatures(ground: BuildingGround): MapFeature[] {
  const dice = new Dice(2718);
  const near = parcels.filter(({ ring }) => distanceM(ring[0] ?? MIDDLE, MIDDLE) < REACH_M);
  return [
    ...near.flatMap(({ ring, use }) =>
      use === 'wood'
        ? randomIn(ring, countFor(ring, 26), dice).map((at) => tree(at, dice.between(2.6, 5.2), 'canopy'))
        : hedgeTrees(ring, dice),
    ),
    ...parkTrees(dice),
    ...gardenTrees(ground, dice),
  ];
}
