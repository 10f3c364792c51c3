import { mark } from './grid';
import type { Point } from './plane';

/** An upright rectangle of the plane. */
export interface Extent {
  westM: number;
  eastM: number;
  southM: number;
  northM: number;
}

/** What is drawn in full detail. */
export const DISTRICT: Extent = { westM: -11_500, eastM: 4800, southM: -7000, northM: 7400 };

/** The island with its neighbouring sea. */
export const ISLAND: Extent = { westM: -48_000, eastM: 5000, southM: -27_000, northM: 29_000 };

const axis = (fromM: number, toM: number, stepM: number) =>
  Array.from({ length: Math.ceil((toM - fromM) / stepM) + 1 }, (_, index) => fromM + index * stepM);

/** Tells, to the nearest `stepM`, which points lie in any of the sets of rings (even-odd within a set); none outside the extent. */
export function maskOver(
  { westM, eastM, southM, northM }: Extent,
  stepM: number,
  ringSets: readonly (readonly (readonly Point[])[])[],
): (point: Point) => boolean {
  const east = axis(westM, eastM, stepM);
  const north = axis(southM, northM, stepM);
  const mask = new Uint8Array(east.length * north.length);
  for (const rings of ringSets) mark(mask, rings, east, north);
  return ([x, y]) => {
    const column = Math.round((x - westM) / stepM);
    const row = Math.round((y - southM) / stepM);
    return column >= 0 && row >= 0 && column < east.length && mask[row * east.length + column] === 1;
  };
}
