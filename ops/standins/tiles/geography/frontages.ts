import { lengthM, placeAt, type Station } from './curves';
import type { BuildingGround } from './ground';
import type { Point } from './plane';
import { Dice } from './random';
import { ROAD_WIDTH_M } from './roads';
import type { FrontageName, Street } from './townStreets';

type Range = readonly [leastM: number, mostM: number];

/** How one kind of building stands along its street. */
interface Frontage {
  widthM: Range;
  depthM: Range;
  setbackM: Range;
  gapM: Range;
  /** Houses in a row before a gap. */
  inARow: Range;
  /** Share of houses with a wing behind. */
  wingShare: number;
  kind: 'house' | 'shop' | 'shed';
}

const FRONTAGES: Record<Exclude<FrontageName, 'none'>, Frontage> = {
  shops: {
    widthM: [7, 15],
    depthM: [12, 19],
    setbackM: [0.5, 1],
    gapM: [2, 5],
    inARow: [4, 9],
    wingShare: 0.5,
    kind: 'shop',
  },
  oldTown: {
    widthM: [6, 12],
    depthM: [8, 13],
    setbackM: [0.3, 1.6],
    gapM: [2, 9],
    inARow: [2, 6],
    wingShare: 0.35,
    kind: 'house',
  },
  terrace: {
    widthM: [5.2, 6],
    depthM: [8.5, 9.5],
    setbackM: [3.4, 3.6],
    gapM: [3, 6],
    inARow: [8, 16],
    wingShare: 0.9,
    kind: 'house',
  },
  pairs: {
    widthM: [7, 8.2],
    depthM: [8.5, 10],
    setbackM: [6, 7.5],
    gapM: [4.5, 8],
    inARow: [2, 2],
    wingShare: 0.3,
    kind: 'house',
  },
  villas: {
    widthM: [10, 15],
    depthM: [9, 13],
    setbackM: [8, 13],
    gapM: [8, 15],
    inARow: [1, 1],
    wingShare: 0.6,
    kind: 'house',
  },
  sheds: {
    widthM: [28, 64],
    depthM: [26, 46],
    setbackM: [9, 15],
    gapM: [10, 24],
    inARow: [1, 1],
    wingShare: 0.3,
    kind: 'shed',
  },
  farms: {
    widthM: [12, 26],
    depthM: [10, 16],
    setbackM: [12, 40],
    gapM: [260, 700],
    inARow: [1, 3],
    wingShare: 0.4,
    kind: 'shed',
  },
};

export interface Building {
  ring: Point[];
  kind: Frontage['kind'] | 'outhouse';
}

function corner({ point, along, left }: Station, alongM: number, leftM: number): Point {
  return [point[0] + along[0] * alongM + left[0] * leftM, point[1] + along[1] * alongM + left[1] * leftM];
}

interface Yard {
  /** From the edge of the street to the front of what stands behind. */
  setbackM: Range;
  widthM: Range;
  depthM: Range;
  everyM: Range;
  kind: 'house' | 'outhouse';
}

const courts: Yard = { setbackM: [19, 34], widthM: [6, 17], depthM: [5, 12], everyM: [3, 24], kind: 'house' };
const gardens: Yard = {
  setbackM: [18, 27],
  widthM: [1.8, 3.4],
  depthM: [2, 4],
  everyM: [7, 34],
  kind: 'outhouse',
};

const YARDS: Partial<Record<FrontageName, Yard>> = {
  shops: courts,
  oldTown: courts,
  terrace: gardens,
  pairs: gardens,
};

/** Puts what stands behind the houses of a street: courts in the old town, garden sheds elsewhere. */
export function buildBehind(street: Street, ground: BuildingGround, seed: number): Building[] {
  const yard = YARDS[street.frontage];
  if (!yard) return [];
  const dice = new Dice(seed);
  const buildings: Building[] = [];
  const endM = lengthM(street.points);
  for (const side of [1, -1] as const) {
    for (let atM = dice.between(6, 14); atM < endM; atM += dice.between(...yard.everyM)) {
      const place = placeAt(street.points, atM);
      const frontM = ROAD_WIDTH_M[street.kind] / 2 + dice.between(...yard.setbackM);
      const widthM = dice.between(...yard.widthM);
      const depthM = dice.between(...yard.depthM);
      const ring = place && rowHouse(place, side, { widthM, frontM, depthM });
      if (ring && ground.claim(ring)) buildings.push({ ring, kind: yard.kind });
      atM += widthM;
    }
  }
  return buildings;
}

/** Builds up both sides of a street, house by house, wherever the ground allows. */
export function buildAlong(street: Street, ground: BuildingGround, seed: number): Building[] {
  if (street.frontage === 'none') return [];
  const frontage = FRONTAGES[street.frontage];
  const dice = new Dice(seed);
  return ([1, -1] as const).flatMap((side) => buildSide(street, side, frontage, ground, dice));
}

function buildSide(
  street: Street,
  side: 1 | -1,
  frontage: Frontage,
  ground: BuildingGround,
  dice: Dice,
): Building[] {
  const buildings: Building[] = [];
  const endM = lengthM(street.points);
  const draw = ([least, most]: Range) => dice.between(least, most);
  let atM = dice.between(2, 6);
  let left = 0;
  let setbackM = 0;
  let depthM = 0;
  while (atM < endM) {
    if (left <= 0) {
      left = Math.round(draw(frontage.inARow));
      setbackM = draw(frontage.setbackM);
      depthM = draw(frontage.depthM);
    }
    if (street.frontage === 'oldTown' || street.frontage === 'shops') depthM = draw(frontage.depthM);
    const widthM = draw(frontage.widthM);
    const place = placeAt(street.points, Math.min(endM, atM + widthM / 2));
    const frontM = ROAD_WIDTH_M[street.kind] / 2 + setbackM;
    const isWinged = dice.chance(frontage.wingShare);
    const footprint = place && rowHouse(place, side, { widthM, frontM, depthM });
    if (place && footprint && ground.claim(footprint)) {
      buildings.push({
        ring: isWinged ? winged(place, side, { widthM, frontM, depthM }) : footprint,
        kind: frontage.kind,
      });
      atM += widthM;
      left -= 1;
      if (left <= 0) atM += draw(frontage.gapM);
    } else {
      atM += 2.5;
      left = 0;
    }
  }
  return buildings;
}

interface Size {
  widthM: number;
  frontM: number;
  depthM: number;
}

function rowHouse(place: Station, side: 1 | -1, { widthM, frontM, depthM }: Size): Point[] {
  const [w, near, back] = [widthM / 2, side * frontM, side * (frontM + depthM)];
  return [corner(place, -w, near), corner(place, w, near), corner(place, w, back), corner(place, -w, back)];
}

/** The house with a wing over half its width at the back. */
function winged(place: Station, side: 1 | -1, { widthM, frontM, depthM }: Size): Point[] {
  const [w, near, back] = [widthM / 2, side * frontM, side * (frontM + depthM)];
  const wing = side * (frontM + depthM * 1.45);
  return [
    corner(place, -w, near),
    corner(place, w, near),
    corner(place, w, back),
    corner(place, 0, back),
    corner(place, 0, wing),
    corner(place, -w, wing),
  ];
}
