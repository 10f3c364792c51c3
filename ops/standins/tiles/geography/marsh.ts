import { lerp, offset, ribbon, segmentsOf, smooth, wander } from './curves';
import { area, line, type MapFeature } from './feature';
import type { Point } from './plane';
import { Dice, noiseAt } from './random';
import { CREEK_MOUTHS } from './channels';
import { blob, distanceToSegmentM, isInside } from './shapes';
import { greatCob, littleCob, marshShoreLine, northBankPoints, southBankPoints } from './shore';

/** The bank that keeps the spring tides off the grazing marsh, from the hythe to the spit. */
const seaWall: Point[] = smooth(
  [
    [-520, 1000],
    [-250, 1178],
    [150, 1260],
    [600, 1330],
    [1080, 1372],
    [1500, 1400],
    [1950, 1380],
    [2350, 1290],
    [2650, 1128],
    [2860, 955],
  ],
  30,
);

/** Saltmarsh between the shore and the sea wall. */
export const saltmarsh: Point[] = [...marshShoreLine, ...offset(seaWall, -5)];

/** Reeds along a bank of the river, in a belt of uneven width on its landward side. */
function reedbed(
  bankPoints: readonly Point[],
  from: number,
  to: number,
  landward: 1 | -1,
  seed: number,
): Point[] {
  const shore = bankPoints.slice(Math.round(from * bankPoints.length), Math.round(to * bankPoints.length));
  const inner = offset(shore, (index) => {
    const ends = Math.min(1, 4 * Math.min(index / shore.length, 1 - index / shore.length));
    const point = shore[index] ?? [0, 0];
    return landward * ends * (44 + 34 * noiseAt(point, 150, seed, 2));
  });
  return [...shore, ...inner.reverse()];
}

const reedbeds: Point[][] = [
  reedbed(northBankPoints, 0.84, 0.99, 1, 171),
  reedbed(northBankPoints, 0.66, 0.78, 1, 173),
  reedbed(southBankPoints, 0.9, 1, -1, 175),
  reedbed(southBankPoints, 0.71, 0.8, -1, 177),
  reedbed(northBankPoints, 0.45, 0.56, 1, 179),
];

/** Land taken from the marsh: flat, wet, cut by straight ditches. */
export const grazingMarsh: Point[] = [
  ...offset(seaWall, 5),
  [2960, 1350],
  [2900, 1640],
  [2440, 1748],
  [1900, 1835],
  [1000, 1876],
  [300, 1784],
  [-100, 1600],
  [-330, 1300],
];

const isClearOfWall = (point: Point) =>
  isInside(point, saltmarsh) && segmentsOf(seaWall).every(([a, b]) => distanceToSegmentM(point, a, b) > 26);

interface Creek {
  points: Point[];
  mouthM: number;
}

const STEP_M = 7;
const CLEAR_M = 11;

/** Keeps creeks from running into each other: remembers which squares of the marsh are taken, and by which creek. */
class Taken {
  private readonly squares = new Map<string, number>();
  private readonly key = (column: number, row: number) => `${column},${row}`;

  isFree([x, y]: Point, owner: number, parent: number): boolean {
    const [column, row] = [Math.floor(x / CLEAR_M), Math.floor(y / CLEAR_M)];
    for (let c = column - 1; c <= column + 1; c += 1) {
      for (let r = row - 1; r <= row + 1; r += 1) {
        const found = this.squares.get(this.key(c, r));
        if (found !== undefined && found !== owner && found !== parent) return false;
      }
    }
    return true;
  }

  take([x, y]: Point, owner: number): void {
    this.squares.set(this.key(Math.floor(x / CLEAR_M), Math.floor(y / CLEAR_M)), owner);
  }
}

interface Sprout {
  from: Point;
  headingRad: number;
  reachM: number;
  mouthM: number;
  parent: number;
}

/** Lets creeks grow inland from their mouths, stems before branches, each narrower than the one it joins. */
function grow(sprouts: Sprout[], dice: Dice): Creek[] {
  const taken = new Taken();
  const creeks: Creek[] = [];
  for (let owner = 0; owner < sprouts.length; owner += 1) {
    const sprout = sprouts[owner];
    if (!sprout) continue;
    const { points, branches } = growOne(sprout, owner, taken, dice);
    if (points.length < 5) continue;
    creeks.push({ points, mouthM: sprout.mouthM });
    sprouts.push(...branches);
  }
  return creeks;
}

function growOne(
  { from, headingRad, reachM, mouthM, parent }: Sprout,
  owner: number,
  taken: Taken,
  dice: Dice,
): { points: Point[]; branches: Sprout[] } {
  const points: Point[] = [from];
  const branches: Sprout[] = [];
  const seed = Math.floor(dice.next() * 1e6);
  const bendM = 16 + mouthM * 2.2;
  let at = from;
  let sinceBranchM = 0;
  for (let goneM = 0; goneM < reachM; goneM += STEP_M) {
    const swing = Math.min(1, goneM / 30) * 0.75 * Math.sin(seed + goneM / bendM);
    const heading = headingRad + swing + 1.1 * noiseAt(at, 80, seed, 2);
    at = [at[0] + STEP_M * Math.cos(heading), at[1] + STEP_M * Math.sin(heading)];
    const isNearParent = goneM < 3 * CLEAR_M;
    if (goneM > 14 && !isClearOfWall(at)) break;
    if (!taken.isFree(at, owner, isNearParent ? parent : owner)) break;
    points.push(at);
    taken.take(at, owner);
    sinceBranchM += STEP_M;
    if (mouthM > 1.8 && sinceBranchM > 24 && dice.chance(0.4)) {
      const turn = (dice.chance(0.5) ? 1 : -1) * dice.between(0.8, 1.4);
      const left = 1 - goneM / reachM;
      branches.push({
        from: at,
        headingRad: headingRad + turn,
        reachM: reachM * dice.between(0.25, 0.6),
        mouthM: mouthM * (0.25 + 0.4 * left),
        parent: owner,
      });
      sinceBranchM = 0;
    }
  }
  return { points, branches };
}

const creeks: Creek[] = (() => {
  const dice = new Dice(2027);
  const stems = CREEK_MOUTHS.map(([x, y]): Sprout => ({
    from: [x, y - 14],
    headingRad: Math.PI / 2 + dice.between(-0.35, 0.35),
    reachM: dice.between(260, 440),
    mouthM: dice.between(8, 17),
    parent: -1,
  }));
  return grow(stems, dice);
})();

const LEVEL_ROWS = [0.02, 0.27, 0.5, 0.74, 1];
const outerEdge: Point[] = smooth(
  [
    [-330, 1330],
    [-60, 1612],
    [330, 1776],
    [1000, 1862],
    [1900, 1820],
    [2440, 1734],
    [2880, 1620],
  ],
  30,
);

/** A place on the grazing marsh by its shares of the way along the sea wall and away from it. */
function levelPoint(along: number, away: number): Point {
  const at = (points: readonly Point[]) => points[Math.round(along * (points.length - 1))] ?? [0, 0];
  return wander(lerp(at(offset(seaWall, 18)), at(outerEdge), away), 16, 260, 521);
}

/** Straight ditches that part the grazing marsh into long fields, staggered from row to row. */
function ditches(): Point[][] {
  const dice = new Dice(515);
  const shares = Array.from({ length: 60 }, (_, index) => index / 59);
  const rows = LEVEL_ROWS.map((away) => shares.map((along) => levelPoint(along, away)));
  const crossings = LEVEL_ROWS.slice(1).flatMap((away, index) => {
    const from = LEVEL_ROWS[index] ?? 0;
    const lines: Point[][] = [];
    for (let along = dice.between(0.01, 0.05); along < 0.99; along += dice.between(0.028, 0.07)) {
      lines.push([levelPoint(along, from), levelPoint(along + dice.between(-0.004, 0.004), away)]);
    }
    return lines;
  });
  return [...rows, ...crossings];
}

/** Tufts of marsh grass: three short strokes each, as on old maps. */
function tufts(): MapFeature[] {
  const dice = new Dice(3141);
  const meadows: { ring: Point[]; count: number }[] = [
    { ring: saltmarsh, count: 620 },
    { ring: grazingMarsh, count: 260 },
    { ring: greatCob, count: 70 },
    { ring: littleCob, count: 16 },
  ];
  return meadows.flatMap(({ ring, count }) => {
    const xs = ring.map(([x]) => x);
    const ys = ring.map(([, y]) => y);
    const inBox = (): Point => [
      dice.between(Math.min(...xs), Math.max(...xs)),
      dice.between(Math.min(...ys), Math.max(...ys)),
    ];
    return Array.from({ length: count }, inBox)
      .filter((at) => isInside(at, ring))
      .flatMap(([x, y]) =>
        [-1, 0, 1].map((lean) =>
          line(
            'wetland',
            { minzoom: 14 },
            [
              [x + lean * 2.2, y],
              [x + lean * 4.6, y + (lean === 0 ? 7 : 5)],
            ],
            { class: 'tuft' },
          ),
        ),
      );
  });
}

export function marshFeatures(): MapFeature[] {
  const dice = new Dice(99);
  const pools = Array.from({ length: 46 }, (): Point => [dice.between(-200, 2600), dice.between(930, 1370)])
    .filter(isClearOfWall)
    .map((point, index) => blob(point, dice.between(5, 15), dice.between(4, 10), 700 + index));
  return [
    area('wetland', { minzoom: 11 }, [grazingMarsh], { class: 'grazing-marsh' }),
    area('wetland', { minzoom: 10 }, [saltmarsh], { class: 'saltmarsh' }),
    ...[greatCob, littleCob].map((ring) => area('wetland', { minzoom: 10 }, [ring], { class: 'saltmarsh' })),
    ...reedbeds.map((ring) => area('wetland', { minzoom: 12 }, [ring], { class: 'reedbed' })),
    ...creeks.map(({ points, mouthM }) =>
      area(
        'water',
        { minzoom: mouthM > 7.5 ? 12 : mouthM > 3 ? 13 : 14 },
        [ribbon(points, (share) => mouthM * (1.12 - share) ** 1.3 + 0.8)],
        { class: 'creek' },
      ),
    ),
    ...pools.map((ring) => area('water', { minzoom: 14 }, [ring], { class: 'pool' })),
    ...ditches().map((points) => line('water', { minzoom: 13 }, points, { class: 'ditch' })),
    ...tufts(),
    line('structures', { minzoom: 12 }, seaWall, { class: 'sea-wall' }),
  ];
}
