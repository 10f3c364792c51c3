/**
 * The estuary's own drawing plane: metres east and north of the centre of the invented map.
 * The centre lies in open sea, so that no real place is meant.
 */
export type Point = readonly [eastM: number, northM: number];

const CENTRE = { latitude: 54.1, longitude: 1.6 } as const;

const METRES_PER_DEGREE_NORTH = 111_320;
const METRES_PER_DEGREE_EAST = METRES_PER_DEGREE_NORTH * Math.cos((CENTRE.latitude * Math.PI) / 180);
/** Seven decimals of a degree are about a centimetre. */
const DECIMALS = 1e7;

/** Longitude and latitude in degrees, GeoJSON order, of a point of the plane. */
export function toLngLat([eastM, northM]: Point): [longitude: number, latitude: number] {
  const longitude = CENTRE.longitude + eastM / METRES_PER_DEGREE_EAST;
  const latitude = CENTRE.latitude + northM / METRES_PER_DEGREE_NORTH;
  return [Math.round(longitude * DECIMALS) / DECIMALS, Math.round(latitude * DECIMALS) / DECIMALS];
}
