import type { LayerSpecification } from 'maplibre-gl';
import type { RoadClass } from '../geography/roads';
import type { Palette } from './palette';
import { byZoom, DETAIL_ZOOM, ofClass } from './scale';

const roads = { source: 'merrow', 'source-layer': 'roads' } as const;

interface RoadDrawing {
  classes: RoadClass[];
  minzoom: number;
  /** Widths in pixels of the fill, at these zooms; the casing adds a margin. */
  widths: [zoom: number, pixels: number][];
  fill: keyof Palette;
  casing: keyof Palette;
}

/** Small roads first: the larger lie on top. */
const DRAWINGS: RoadDrawing[] = [
  {
    classes: ['service'],
    minzoom: 14,
    widths: [
      [14, 0.8],
      [16, 3],
      [18, 11],
    ],
    fill: 'road',
    casing: 'roadCasing',
  },
  {
    classes: ['street', 'lane'],
    minzoom: 12,
    widths: [
      [12, 0.5],
      [13, 1],
      [14.5, 2.6],
      [16, 6.5],
      [18, 19],
    ],
    fill: 'road',
    casing: 'roadCasing',
  },
  {
    classes: ['tertiary'],
    minzoom: 11,
    widths: [
      [11, 0.6],
      [13, 1.6],
      [15, 4.4],
      [18, 21],
    ],
    fill: 'road',
    casing: 'roadCasing',
  },
  {
    classes: ['secondary'],
    minzoom: 9,
    widths: [
      [9, 0.6],
      [12, 1.8],
      [14, 3.8],
      [16, 9],
      [18, 24],
    ],
    fill: 'secondary',
    casing: 'primaryCasing',
  },
  {
    classes: ['primary'],
    minzoom: 7,
    widths: [
      [7, 0.7],
      [11, 2],
      [13, 3.4],
      [15, 6.6],
      [16, 10],
      [18, 28],
    ],
    fill: 'primary',
    casing: 'primaryCasing',
  },
];

const round = { 'line-cap': 'round', 'line-join': 'round' } as const;

/** All roads: first every casing, then every fill, so that junctions open into each other. */
export function roadLayers(ink: Palette): LayerSpecification[] {
  const casings = DRAWINGS.map(({ classes, minzoom, widths, casing }): LayerSpecification => ({
    id: `${classes[0]}-casing`,
    type: 'line',
    ...roads,
    filter: ofClass(...classes),
    minzoom: Math.max(minzoom, DETAIL_ZOOM),
    layout: round,
    paint: {
      'line-color': ink[casing],
      'line-width': byZoom(
        ...widths.map(([zoom, width]): [number, number] => [zoom, width + 0.9 + width * 0.09]),
      ),
    },
  }));
  const fills = DRAWINGS.map(({ classes, minzoom, widths, fill }): LayerSpecification => ({
    id: `${classes[0]}-fill`,
    type: 'line',
    ...roads,
    filter: ofClass(...classes),
    minzoom,
    layout: round,
    paint: {
      // Without a casing the fill would hardly be seen.
      'line-color':
        minzoom < DETAIL_ZOOM ? ['step', ['zoom'], ink.farRoad, DETAIL_ZOOM, ink[fill]] : ink[fill],
      'line-width': byZoom(...widths),
    },
  }));
  return [...wayLayers(ink), ...casings, ...fills];
}

function wayLayers(ink: Palette): LayerSpecification[] {
  return [
    {
      id: 'tracks',
      type: 'line',
      ...roads,
      filter: ofClass('track'),
      minzoom: 13,
      paint: {
        'line-color': ink.track,
        'line-width': byZoom([13, 0.8], [16, 2.4], [18, 5]),
        'line-dasharray': [4, 1.4],
      },
    },
    {
      id: 'paths',
      type: 'line',
      ...roads,
      filter: ofClass('path'),
      minzoom: 13.5,
      paint: {
        'line-color': ink.path,
        'line-width': byZoom([13.5, 0.6], [16, 1.2], [18, 2.4]),
        'line-dasharray': [2.4, 2],
      },
    },
    {
      id: 'ferries',
      type: 'line',
      ...roads,
      filter: ofClass('ferry'),
      minzoom: DETAIL_ZOOM,
      paint: {
        'line-color': ink.ferry,
        'line-width': byZoom([12, 0.8], [16, 1.4]),
        'line-dasharray': [5, 4],
      },
    },
  ];
}
