import type { MapLayers, NetworkWind } from '#lib/contracts/networkMap';
import { formatDuration } from '#lib/format/durations';
import { formatDirection, formatSpeed } from '#lib/format/wind';

type Wind = NetworkWind['items'][number];
type ComplaintPlace = MapLayers['complaints']['places'][number];

/** Something that a layer shows at a place of the map. */
export type LayerMark = { id: string; latitude: number; longitude: number } & (
  { kind: 'wind'; wind: Wind } | { kind: 'complaints'; references: string[] }
);

/** Marks of the layers that are shown: masts first, then complaints, then stations with wind sensors. */
export function layerMarks(
  winds: readonly Wind[] | undefined = [],
  complaints: readonly ComplaintPlace[] | undefined = [],
): LayerMark[] {
  const arrows = winds.map((wind) => ({
    id: `wind ${wind.source} ${wind.code}`,
    kind: 'wind' as const,
    wind,
    ...placeOf(wind),
  }));
  return [
    ...arrows.filter(({ wind }) => wind.source === 'mast'),
    ...complaints.map((place) => ({
      id: `complaints ${place.latitude} ${place.longitude}`,
      kind: 'complaints' as const,
      references: place.references,
      ...placeOf(place),
    })),
    ...arrows.filter(({ wind }) => wind.source === 'station'),
  ];
}

/** "3.2 m/s from SW (225°), 2 min old" */
export function windWords({ speed, direction, ageSeconds }: Wind): string {
  return `${formatSpeed(speed)} ${formatDirection(direction)}, ${ageWords(ageSeconds)}`;
}

/** "2 complaints, place rounded to about 1 km" */
export function complaintsWords(count: number): string {
  return `${count} ${count === 1 ? 'complaint' : 'complaints'}, place rounded to about 1 km`;
}

function ageWords(sec: number): string {
  return sec < 60 ? 'less than 1 min old' : `${formatDuration(Math.floor(sec / 60) * 60)} old`;
}

function placeOf({ latitude, longitude }: { latitude: number; longitude: number }) {
  return { latitude, longitude };
}
