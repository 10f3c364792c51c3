import { type Size, type SlipPoint } from './placeSlips';

/** A place on the earth. */
export interface Place {
  latitude: number;
  longitude: number;
}

/** Half the side of the smallest stretch shown, degrees of latitude (about 500 m). */
const LEAST_HALF_DEG = 0.0045;

/**
 * Where places lie on a plan of some size, north up, all within a margin: the map's stand-in where there is no WebGL. Degrees
 * of longitude are shortened by the cosine of the middle latitude, which is exact enough over a network.
 */
export function planPoints(
  places: readonly (Place & { code: string })[],
  size: Size,
  marginPx: number,
): SlipPoint[] {
  const middle = {
    latitude: middleOf(places.map(({ latitude }) => latitude)),
    longitude: middleOf(places.map(({ longitude }) => longitude)),
  };
  const shorten = Math.cos((middle.latitude * Math.PI) / 180);
  const east = (place: Place) => (place.longitude - middle.longitude) * shorten;
  const north = (place: Place) => place.latitude - middle.latitude;
  const halfEast = Math.max(LEAST_HALF_DEG, ...places.map((place) => Math.abs(east(place))));
  const halfNorth = Math.max(LEAST_HALF_DEG, ...places.map((place) => Math.abs(north(place))));
  const pxPerDeg = Math.min((size.width / 2 - marginPx) / halfEast, (size.height / 2 - marginPx) / halfNorth);
  return places.map((place) => ({
    id: place.code,
    x: size.width / 2 + east(place) * pxPerDeg,
    y: size.height / 2 - north(place) * pxPerDeg,
  }));
}

function middleOf(values: readonly number[]): number {
  return values.length === 0 ? 0 : (Math.min(...values) + Math.max(...values)) / 2;
}
