const EARTH_RADIUS_M = 6_371_008.8;
const WINDS = [
  'north',
  'north-east',
  'east',
  'south-east',
  'south',
  'south-west',
  'west',
  'north-west',
] as const;

export type Wind = (typeof WINDS)[number];

/** A point on the earth, degrees. */
export interface Place {
  latitude: number;
  longitude: number;
}

/** Great-circle distance in metres on a sphere of the mean radius (IUGG): within 0.6 % of the ellipsoid. */
export function distanceM(a: Place, b: Place): number {
  const [latA, latB] = [radians(a.latitude), radians(b.latitude)];
  const halfLat = Math.sin((latB - latA) / 2);
  const halfLon = Math.sin(radians(b.longitude - a.longitude) / 2);
  const chord = halfLat ** 2 + Math.cos(latA) * Math.cos(latB) * halfLon ** 2;
  return 2 * EARTH_RADIUS_M * Math.asin(Math.min(1, Math.sqrt(chord)));
}

/** The wind towards which `to` lies from `from`. */
export function windTowards(from: Place, to: Place): Wind {
  const eighth = Math.round(bearingDeg(from, to) / 45);
  return WINDS[eighth % 8] ?? 'north';
}

/** The wind of a name; null for any other text. */
export function windNamed(name: string | null): Wind | null {
  return WINDS.find((wind) => wind === name) ?? null;
}

/** The initial bearing of `to` from `from` along the great circle, degrees clockwise of north, 0 to 360. */
export function bearingDeg(from: Place, to: Place): number {
  const [latA, latB] = [radians(from.latitude), radians(to.latitude)];
  const lon = radians(to.longitude - from.longitude);
  const y = Math.sin(lon) * Math.cos(latB);
  const x = Math.cos(latA) * Math.sin(latB) - Math.sin(latA) * Math.cos(latB) * Math.cos(lon);
  return ((Math.atan2(y, x) * 180) / Math.PI + 360) % 360;
}

/** A distance as told to people: `about 350 m` in steps of 50 m, `about 1.2 km` from 1 km on. */
export function distanceInWords(metres: number): string {
  if (metres < 25) return 'at that very place';
  const fifties = Math.round(metres / 50) * 50;
  return fifties < 1000 ? `about ${fifties} m` : `about ${(metres / 1000).toFixed(1)} km`;
}

/** A place to 0.01 degree (about 1.1 km), coarse enough to name no house. */
export function coarsePlace(place: Place): Place {
  return {
    latitude: Math.round(place.latitude * 100) / 100,
    longitude: Math.round(place.longitude * 100) / 100,
  };
}

function radians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}
