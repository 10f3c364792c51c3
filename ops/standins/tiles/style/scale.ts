import type { ExpressionSpecification } from 'maplibre-gl';

/** Metres that one pixel shows at zoom 0 at the estuary's latitude (512-pixel tiles). */
const METRES_PER_PIXEL_AT_0 = (40_075_017 * Math.cos((54.1 * Math.PI) / 180)) / 512;

/** A width in pixels that stays the same number of metres on the ground. */
export function metres(widthM: number): ExpressionSpecification {
  const pixelsAt = (zoom: number) => (widthM * 2 ** zoom) / METRES_PER_PIXEL_AT_0;
  return ['interpolate', ['exponential', 2], ['zoom'], 8, pixelsAt(8), 22, pixelsAt(22)];
}

/** A value given at some zooms, in between on a curve. */
export function byZoom(...stops: [zoom: number, value: number][]): ExpressionSpecification {
  return ['interpolate', ['exponential', 1.5], ['zoom'], ...stops.flat()] as ExpressionSpecification;
}

/** Features of one or several classes. */
export function ofClass(...classes: string[]): ExpressionSpecification {
  return ['in', ['get', 'class'], ['literal', classes]];
}

/** A value by class of feature. */
export function byClass(values: Record<string, string>, otherwise: string): ExpressionSpecification {
  return [
    'match',
    ['get', 'class'],
    ...Object.entries(values).flat(),
    otherwise,
  ] as unknown as ExpressionSpecification;
}

/**
 * The zoom below which a whole network is seen, and the map is but its ground: without marks, dashes, casings and smoothed edges, each of
 * which is one more program to compile, which takes a browser without a GPU some hundredth to tenths of a second.
 */
export const DETAIL_ZOOM = 11.5;

/** Edges of areas are smoothed where details are drawn. */
export const SMOOTH_EDGES: ExpressionSpecification = ['step', ['zoom'], false, DETAIL_ZOOM, true];
