import type { ExpressionSpecification, LayerSpecification, SymbolLayerSpecification } from 'maplibre-gl';
import type { LayerName } from '../geography/feature';
import type { Palette } from './palette';
import { byZoom, DETAIL_ZOOM, ofClass } from './scale';

/**
 * No glyphs are served: MapLibre draws letters with the page's own Noto Sans. The first name of a stack gives
 * weight and slant; the second is the family that the page has.
 */
const REGULAR = ['Noto Sans'];
const MEDIUM = ['Noto Sans Medium', 'Noto Sans'];
const BOLD = ['Noto Sans Bold', 'Noto Sans'];
const ITALIC = ['Noto Sans Italic', 'Noto Sans'];

interface Label {
  id: string;
  layer: LayerName;
  filter: ExpressionSpecification;
  minzoom?: number;
  maxzoom?: number;
  font: string[];
  size: number | ExpressionSpecification;
  colour: string;
  halo: string;
  layout?: SymbolLayerSpecification['layout'];
}

function label({
  id,
  layer,
  filter,
  minzoom,
  maxzoom,
  font,
  size,
  colour,
  halo,
  layout,
}: Label): LayerSpecification {
  return {
    id,
    type: 'symbol',
    source: 'merrow',
    'source-layer': layer,
    filter,
    ...(minzoom === undefined ? {} : { minzoom }),
    ...(maxzoom === undefined ? {} : { maxzoom }),
    layout: {
      'text-field': ['get', 'name'],
      'text-font': font,
      'text-size': size,
      'text-max-width': 8,
      'text-padding': 4,
      ...layout,
    },
    paint: { 'text-color': colour, 'text-halo-color': halo, 'text-halo-width': 1.5, 'text-halo-blur': 0.4 },
  };
}

const alongLine = { 'symbol-placement': 'line', 'text-max-angle': 32 } as const;

/** Names, the least important first: later layers win the room. */
export function labelLayers(ink: Palette): LayerSpecification[] {
  const paper = { halo: ink.halo };
  const water = { halo: ink.waterHalo, colour: ink.waterInk, font: ITALIC };
  return [
    label({
      id: 'soundings',
      layer: 'contours',
      filter: ofClass('sounding'),
      minzoom: 14,
      font: REGULAR,
      size: 10,
      colour: ink.sounding,
      halo: ink.waterHalo,
      layout: { 'text-field': ['to-string', ['get', 'depth']], 'text-padding': 12 },
    }),
    label({
      id: 'street-names',
      layer: 'roads',
      filter: ofClass('street', 'lane', 'service', 'track', 'tertiary'),
      minzoom: 15,
      font: REGULAR,
      size: byZoom([15, 10], [18, 13]),
      colour: ink.softInk,
      ...paper,
      layout: { ...alongLine, 'symbol-spacing': 320 },
    }),
    label({
      id: 'road-names',
      layer: 'roads',
      filter: ofClass('primary', 'secondary'),
      minzoom: 13.5,
      font: MEDIUM,
      size: byZoom([13.5, 10.5], [18, 14]),
      colour: ink.softInk,
      ...paper,
      layout: { ...alongLine, 'symbol-spacing': 420 },
    }),
    label({
      id: 'building-names',
      layer: 'buildings',
      filter: ['all', ['has', 'name'], ofClass('industrial')],
      minzoom: 16,
      font: REGULAR,
      size: 11,
      colour: ink.softInk,
      ...paper,
      layout: { 'text-max-width': 6 },
    }),
    label({
      id: 'berths',
      layer: 'places',
      filter: ofClass('berth'),
      minzoom: 15.5,
      size: 10.5,
      ...water,
    }),
    label({
      id: 'ferry-names',
      layer: 'roads',
      filter: ofClass('ferry'),
      minzoom: 13.5,
      size: 10.5,
      ...water,
      layout: { ...alongLine, 'symbol-spacing': 500 },
    }),
    label({
      id: 'green-names',
      minzoom: DETAIL_ZOOM,
      layer: 'places',
      filter: ofClass('green'),
      font: ITALIC,
      size: byZoom([11, 10.5], [16, 14]),
      colour: ink.greenInk,
      ...paper,
      layout: { 'text-letter-spacing': 0.02 },
    }),
    label({
      id: 'area-names',
      layer: 'places',
      filter: ofClass('area'),
      minzoom: 13,
      font: MEDIUM,
      size: byZoom([13, 10.5], [17, 13.5]),
      colour: ink.softInk,
      ...paper,
    }),
    ...poiLayers(ink),
    label({
      id: 'quarter-names',
      layer: 'places',
      filter: ofClass('quarter'),
      minzoom: 13.8,
      maxzoom: 16.6,
      font: MEDIUM,
      size: byZoom([14, 11], [16, 13.5]),
      colour: ink.softInk,
      ...paper,
      layout: { 'text-letter-spacing': 0.14, 'text-transform': 'uppercase', 'text-max-width': 7 },
    }),
    label({
      id: 'water-lines',
      minzoom: DETAIL_ZOOM,
      layer: 'places',
      filter: ofClass('water-line'),
      size: byZoom([11, 11], [16, 17]),
      ...water,
      layout: { ...alongLine, 'symbol-placement': 'line-center', 'text-letter-spacing': 0.12 },
    }),
    label({
      id: 'waters',
      layer: 'places',
      filter: ofClass('water', 'sea'),
      size: byZoom([8, 11], [11, 11.5], [16, 15]),
      ...water,
      layout: { 'text-letter-spacing': 0.08, 'text-max-width': 6 },
    }),
    label({
      id: 'villages',
      layer: 'places',
      filter: ofClass('village', 'hamlet'),
      font: MEDIUM,
      size: byZoom([10, 10.5], [13, 12.5], [16, 16]),
      colour: ink.ink,
      ...paper,
    }),
    label({
      id: 'towns',
      layer: 'places',
      filter: ofClass('town'),
      font: MEDIUM,
      size: byZoom([7, 11], [12, 15]),
      colour: ink.ink,
      ...paper,
    }),
    label({
      id: 'island',
      layer: 'places',
      filter: ofClass('island'),
      maxzoom: 10.5,
      font: MEDIUM,
      size: byZoom([6, 11], [10, 16]),
      colour: ink.softInk,
      ...paper,
      layout: { 'text-letter-spacing': 0.3, 'text-transform': 'uppercase' },
    }),
    label({
      id: 'city',
      layer: 'places',
      filter: ofClass('city'),
      maxzoom: 14.2,
      font: BOLD,
      size: byZoom([6, 12], [10, 15], [13, 20]),
      colour: ink.ink,
      ...paper,
      layout: { 'text-padding': 2 },
    }),
  ];
}

/** Marked points: a ring with a dot, and the name beneath. */
function poiLayers(ink: Palette): LayerSpecification[] {
  return [
    {
      id: 'poi-marks',
      minzoom: DETAIL_ZOOM,
      type: 'circle',
      source: 'merrow',
      'source-layer': 'poi',
      paint: {
        'circle-radius': byZoom([10, 1.6], [14, 2.6], [17, 3.6]),
        'circle-color': ink.halo,
        'circle-stroke-color': ['match', ['get', 'class'], ['lighthouse', 'ferry'], ink.waterInk, ink.ink],
        'circle-stroke-width': byZoom([10, 1], [16, 1.6]),
      },
    },
    label({
      id: 'poi-names',
      minzoom: DETAIL_ZOOM,
      layer: 'poi',
      filter: ['has', 'name'],
      font: REGULAR,
      size: byZoom([10, 10], [14, 11], [17, 12.5]),
      colour: ink.ink,
      halo: ink.halo,
      layout: {
        'text-variable-anchor': ['top', 'bottom', 'right', 'left'],
        'text-radial-offset': 0.6,
        'text-max-width': 7,
      },
    }),
  ];
}
