import { distanceM, placeAt, lengthM, ribbon } from './curves';
import { area, type MapFeature } from './feature';
import type { Point } from './plane';
import { mainRoads } from './roads';

interface Bridge {
  road: string;
  middle: Point;
  lengthM: number;
}

const BRIDGES: Bridge[] = [
  { road: 'Bridge Road', middle: [-2850, 420], lengthM: 150 },
  { road: 'Hallowstone Road', middle: [-895, -1535], lengthM: 90 },
  { road: 'Eastgate Road', middle: [1206, -1455], lengthM: 90 },
  { road: 'Saltern Way', middle: [-2650, -1856], lengthM: 80 },
];

/** The deck of a bridge: the stretch of its road about its middle, a little wider than the road. */
function deck({ road, middle, lengthM: deckM }: Bridge): Point[] {
  const points = mainRoads.find(({ name }) => name === road)?.points ?? [];
  const roadM = lengthM(points);
  const samples = Array.from({ length: Math.ceil(roadM / 8) }, (_, index) =>
    placeAt(points, index * 8),
  ).filter((place) => place !== null && distanceM(place.point, middle) <= deckM / 2);
  return ribbon(
    samples.flatMap((place) => (place ? [place.point] : [])),
    19,
  );
}

export function bridgeFeatures(): MapFeature[] {
  return BRIDGES.map((bridge) => area('structures', { minzoom: 14 }, [deck(bridge)], { class: 'bridge' }));
}
