import type { Feature, Geometry } from 'geojson';
import { toLngLat, type Point } from './plane';

/** The layers of a tile. */
export const LAYERS = [
  'water',
  'wetland',
  'landuse',
  'contours',
  'structures',
  'rail',
  'roads',
  'buildings',
  'places',
  'poi',
] as const;
export type LayerName = (typeof LAYERS)[number];

/** Zoom levels at which a feature is in the tiles, both included. */
export interface ZoomRange {
  minzoom: number;
  maxzoom?: number;
}

export interface MapFeature extends ZoomRange {
  layer: LayerName;
  feature: Feature;
}

type Properties = Record<string, string | number>;

function feature(layer: LayerName, zoom: ZoomRange, properties: Properties, geometry: Geometry): MapFeature {
  return { layer, ...zoom, feature: { type: 'Feature', properties, geometry } };
}

function closed(ring: readonly Point[]): [number, number][] {
  const positions = ring.map(toLngLat);
  const first = positions[0];
  return first ? [...positions, first] : positions;
}

/** An area of one outer ring and any holes; rings are given without their first point repeated. */
export function area(
  layer: LayerName,
  zoom: ZoomRange,
  rings: readonly (readonly Point[])[],
  properties: Properties,
): MapFeature {
  return feature(layer, zoom, properties, { type: 'Polygon', coordinates: rings.map(closed) });
}

export function line(
  layer: LayerName,
  zoom: ZoomRange,
  points: readonly Point[],
  properties: Properties,
): MapFeature {
  return feature(layer, zoom, properties, { type: 'LineString', coordinates: points.map(toLngLat) });
}

export function spot(layer: LayerName, zoom: ZoomRange, point: Point, properties: Properties): MapFeature {
  return feature(layer, zoom, properties, { type: 'Point', coordinates: toLngLat(point) });
}
