import type { ExpressionSpecification, LayerSpecification } from 'maplibre-gl';
import type { LayerName } from '../geography/feature';
import type { Palette } from './palette';
import { byClass, byZoom, DETAIL_ZOOM, metres, ofClass, SMOOTH_EDGES } from './scale';

const from = (layer: LayerName) => ({ source: 'merrow', 'source-layer': layer }) as const;

// Every area has its colour from its feature, even where all are alike: one program to compile for all of them, where two take a
// browser without a GPU a tenth of a second longer.

/** Sea, what dries at low water, depth lines. Land lies on top. */
export function seaLayers(ink: Palette): LayerSpecification[] {
  return [
    { id: 'open-sea', type: 'background', paint: { 'background-color': ink.sea20m } },
    {
      id: 'sea',
      type: 'fill',
      ...from('water'),
      filter: ofClass('sea'),
      paint: {
        'fill-antialias': SMOOTH_EDGES,
        'fill-color': [
          'step',
          ['get', 'depth'],
          ink.seaDrying,
          0,
          ink.seaShallow,
          5,
          ink.sea5m,
          10,
          ink.sea10m,
          20,
          ink.sea20m,
        ],
      },
    },
    {
      id: 'drying',
      type: 'fill',
      ...from('wetland'),
      filter: ofClass('mud', 'sand'),
      paint: { 'fill-antialias': SMOOTH_EDGES, 'fill-color': byClass({ sand: ink.sand }, ink.mud) },
    },
    {
      id: 'depth-lines',
      type: 'line',
      ...from('contours'),
      filter: ofClass('depth'),
      minzoom: 12,
      paint: {
        'line-color': ink.depthLine,
        'line-width': byZoom([12, 0.4], [16, 0.9]),
        'line-opacity': byZoom([12, 0.35], [14, 0.75]),
      },
    },
  ];
}

function landuseColours(ink: Palette): ExpressionSpecification {
  return byClass(
    {
      land: ink.land,
      heath: ink.heath,
      residential: ink.residential,
      port: ink.port,
      industrial: ink.industrial,
      works: ink.industrial,
      railway: ink.railwayLand,
      quarry: ink.quarry,
      school: ink.school,
      park: ink.green,
      churchyard: ink.green,
      allotments: ink.meadow,
      pitch: ink.pitch,
      playground: ink.quay,
      holiday: ink.meadow,
      scrub: ink.heath,
      square: ink.road,
      pasture: ink.pasture,
      meadow: ink.meadow,
      arable: ink.arable,
      wood: ink.wood,
    },
    ink.land,
  );
}

/** Land and what it is used for. */
export function landLayers(ink: Palette): LayerSpecification[] {
  return [
    {
      id: 'land',
      type: 'fill',
      ...from('landuse'),
      filter: ofClass('land'),
      paint: { 'fill-antialias': SMOOTH_EDGES, 'fill-color': byClass({ land: ink.land }, ink.land) },
    },
    {
      id: 'country',
      type: 'fill',
      ...from('landuse'),
      filter: ofClass('pasture', 'meadow', 'arable', 'heath'),
      minzoom: 8,
      paint: {
        'fill-antialias': SMOOTH_EDGES,
        'fill-color': landuseColours(ink),
        'fill-opacity': byZoom([8, 0.55], [11.9, 0.6], [12, 0.6], [13.5, 1]),
      },
    },
    {
      id: 'woods',
      type: 'fill',
      ...from('landuse'),
      filter: ofClass('wood'),
      minzoom: 8,
      paint: {
        'fill-antialias': SMOOTH_EDGES,
        'fill-color': byClass({ wood: ink.wood }, ink.wood),
        'fill-opacity': byZoom([8, 0.75], [12, 1]),
      },
    },
    {
      id: 'hedges',
      type: 'line',
      ...from('landuse'),
      filter: ofClass('hedge'),
      minzoom: 13,
      paint: {
        'line-color': ink.hedge,
        'line-width': byZoom([13, 0.3], [15, 0.9], [18, 3]),
        'line-opacity': byZoom([13, 0.35], [14.5, 0.9]),
      },
    },
    {
      id: 'heights',
      type: 'line',
      ...from('contours'),
      filter: ofClass('height', 'height-50'),
      minzoom: 13,
      paint: {
        'line-color': ink.heightLine,
        'line-width': ['match', ['get', 'class'], 'height-50', 1.1, 0.6],
        'line-opacity': byZoom([13, 0.3], [14.5, 0.65]),
      },
    },
    {
      id: 'settled',
      type: 'fill',
      ...from('landuse'),
      filter: ofClass('residential', 'port', 'industrial', 'works', 'railway', 'quarry', 'holiday'),
      paint: { 'fill-antialias': SMOOTH_EDGES, 'fill-color': landuseColours(ink) },
    },
    {
      id: 'grounds',
      type: 'fill',
      ...from('landuse'),
      minzoom: DETAIL_ZOOM,
      filter: ofClass('school', 'park', 'churchyard', 'allotments', 'square', 'playground', 'scrub'),
      paint: { 'fill-color': landuseColours(ink) },
    },
    {
      id: 'trees',
      type: 'fill',
      ...from('landuse'),
      filter: ofClass('tree', 'canopy'),
      minzoom: 15,
      paint: {
        'fill-color': byClass({ tree: ink.tree }, ink.tree),
        'fill-opacity': ['interpolate', ['linear'], ['zoom'], 15, 0.25, 16, 0.75],
      },
    },
    {
      id: 'pitches',
      type: 'fill',
      ...from('landuse'),
      filter: ofClass('pitch'),
      minzoom: 13,
      paint: { 'fill-color': byClass({ pitch: ink.pitch }, ink.pitch) },
    },
    {
      id: 'quarry-benches',
      type: 'fill',
      ...from('landuse'),
      minzoom: DETAIL_ZOOM,
      filter: ofClass('quarry-bench'),
      paint: {
        'fill-color': ['interpolate', ['linear'], ['get', 'step'], 0, ink.quarry, 4, ink.quarryFloor],
      },
    },
    {
      id: 'quarry-edges',
      type: 'line',
      ...from('contours'),
      minzoom: DETAIL_ZOOM,
      filter: ofClass('quarry-edge'),
      paint: { 'line-color': ink.quarryEdge, 'line-width': byZoom([13, 0.5], [17, 1.4]) },
    },
    {
      id: 'pitch-lines',
      type: 'line',
      ...from('landuse'),
      filter: ofClass('pitch-line'),
      minzoom: 15,
      paint: { 'line-color': ink.land, 'line-width': byZoom([15, 0.5], [18, 1.5]), 'line-opacity': 0.8 },
    },
    {
      id: 'wetland',
      type: 'fill',
      ...from('wetland'),
      filter: ofClass('saltmarsh', 'reedbed', 'grazing-marsh'),
      paint: {
        'fill-antialias': SMOOTH_EDGES,
        'fill-color': byClass({ saltmarsh: ink.saltmarsh, reedbed: ink.reedbed }, ink.grazingMarsh),
      },
    },
    {
      id: 'shoreline',
      type: 'line',
      ...from('landuse'),
      filter: ofClass('land'),
      paint: {
        'line-color': ink.shoreline,
        'line-width': byZoom([8, 0.5], [13, 0.8], [17, 1.4]),
        'line-opacity': 0.75,
      },
    },
    {
      id: 'tufts',
      type: 'line',
      ...from('wetland'),
      filter: ofClass('tuft'),
      minzoom: 14,
      layout: { 'line-cap': 'round' },
      paint: {
        'line-color': ink.tuft,
        'line-width': byZoom([14, 0.5], [16, 0.9], [18, 1.6]),
        'line-opacity': byZoom([14, 0.4], [15, 0.8]),
      },
    },
  ];
}

/** Rivers, creeks, ditches, ponds. */
export function inlandWaterLayers(ink: Palette): LayerSpecification[] {
  return [
    {
      id: 'inland-water',
      type: 'fill',
      ...from('water'),
      filter: ['all', ['==', ['geometry-type'], 'Polygon'], ['!', ofClass('sea')]],
      paint: { 'fill-antialias': SMOOTH_EDGES, 'fill-color': byClass({ creek: ink.mud }, ink.inlandWater) },
    },
    {
      id: 'rivers',
      type: 'line',
      ...from('water'),
      filter: ofClass('river'),
      layout: { 'line-cap': 'round', 'line-join': 'round' },
      paint: { 'line-color': ink.inlandWater, 'line-width': byZoom([8, 0.8], [12, 1.8], [15, 4], [18, 14]) },
    },
    {
      id: 'ditches',
      type: 'line',
      ...from('water'),
      filter: ofClass('ditch'),
      minzoom: 13,
      paint: { 'line-color': ink.inlandWaterEdge, 'line-width': metres(3.2) },
    },
  ];
}
