import type { LayerSpecification } from 'maplibre-gl';
import type { LayerName } from '../geography/feature';
import type { Palette } from './palette';
import { byClass, byZoom, DETAIL_ZOOM, metres, ofClass } from './scale';

const from = (layer: LayerName) => ({ source: 'merrow', 'source-layer': layer }) as const;

/** Quays, piers, breakwaters, stacks: what lies on the ground or in the water. */
export function structureLayers(ink: Palette): LayerSpecification[] {
  return [
    {
      id: 'structures',
      type: 'fill',
      ...from('structures'),
      minzoom: DETAIL_ZOOM,
      filter: ofClass('quay', 'pier', 'breakwater', 'platform', 'stockpile', 'bridge'),
      paint: {
        'fill-color': byClass(
          { quay: ink.quay, breakwater: ink.rubble, stockpile: ink.quarryEdge, bridge: ink.roadCasing },
          ink.stack,
        ),
      },
    },
    {
      id: 'structure-edges',
      type: 'line',
      ...from('structures'),
      filter: ofClass('pier', 'breakwater', 'platform'),
      minzoom: 14,
      paint: { 'line-color': ink.buildingEdge, 'line-width': byZoom([14, 0.4], [18, 1]) },
    },
    {
      id: 'stacks',
      type: 'fill',
      ...from('structures'),
      minzoom: DETAIL_ZOOM,
      filter: ofClass('container-stack', 'reefer-stack'),
      paint: {
        'fill-color': byClass({ 'container-stack': ink.stack }, ink.stack),
        'fill-opacity': byZoom([13, 1], [15.5, 0.55]),
      },
    },
    {
      id: 'containers',
      type: 'fill',
      ...from('structures'),
      filter: ofClass('container'),
      minzoom: 15,
      paint: {
        'fill-color': [
          'match',
          ['get', 'tone'],
          0,
          ink.reefer,
          1,
          ink.containerA,
          2,
          ink.containerB,
          3,
          ink.containerC,
          ink.containerD,
        ],
        'fill-opacity': byZoom([15, 0.5], [16, 0.9]),
      },
    },
    {
      id: 'sea-wall',
      type: 'line',
      ...from('structures'),
      minzoom: DETAIL_ZOOM,
      filter: ofClass('sea-wall'),
      paint: { 'line-color': ink.bank, 'line-width': byZoom([12, 0.8], [14, 1.6], [16, 5.5], [18, 20]) },
    },
    {
      id: 'crane-rails',
      type: 'line',
      ...from('structures'),
      filter: ofClass('crane-rail', 'conveyor'),
      minzoom: 14,
      paint: { 'line-color': ink.rail, 'line-width': byZoom([14, 0.4], [18, 1.6]) },
    },
  ];
}

export function railLayers(ink: Palette): LayerSpecification[] {
  return [
    {
      id: 'sidings',
      type: 'line',
      ...from('rail'),
      filter: ofClass('siding', 'branch'),
      minzoom: 13,
      paint: {
        'line-color': ink.rail,
        'line-width': byZoom([13, 0.3], [16, 1], [18, 1.8]),
        'line-opacity': byZoom([13, 0.5], [15, 0.9]),
      },
    },
    {
      id: 'rail',
      type: 'line',
      ...from('rail'),
      filter: ofClass('main'),
      paint: { 'line-color': ink.rail, 'line-width': byZoom([8, 0.6], [12, 1.4], [15, 2.6], [18, 5]) },
    },
    {
      id: 'rail-ties',
      type: 'line',
      ...from('rail'),
      filter: ofClass('main'),
      minzoom: DETAIL_ZOOM,
      paint: {
        'line-color': ink.railTie,
        'line-width': byZoom([DETAIL_ZOOM, 0.6], [15, 1.4], [18, 3]),
        'line-dasharray': [5, 5],
      },
    },
  ];
}

/** Footprints; those with a name, and public ones, in a stronger tone. */
export function buildingLayers(ink: Palette): LayerSpecification[] {
  return [
    {
      id: 'buildings',
      type: 'fill',
      ...from('buildings'),
      minzoom: 13,
      paint: {
        'fill-color': byClass(
          {
            school: ink.landmark,
            chapel: ink.landmark,
            civic: ink.landmark,
            silo: ink.landmark,
            industrial: ink.shed,
            shed: ink.shed,
          },
          ink.building,
        ),
        'fill-opacity': byZoom([13, 0.7], [14.5, 1]),
      },
    },
    {
      id: 'building-edges',
      type: 'line',
      ...from('buildings'),
      minzoom: 14.5,
      paint: {
        'line-color': ink.buildingEdge,
        'line-width': byZoom([14.5, 0.3], [17, 0.9], [19, 1.4]),
        'line-opacity': byZoom([14.5, 0.4], [16, 1]),
      },
    },
    {
      id: 'cranes',
      type: 'fill',
      ...from('structures'),
      filter: ofClass('crane', 'crane-legs'),
      minzoom: 14,
      paint: {
        'fill-color': byClass({ crane: ink.crane }, ink.crane),
        'fill-opacity': ['match', ['get', 'class'], 'crane', 0.9, 0.3],
      },
    },
    {
      id: 'crane-edges',
      type: 'line',
      ...from('structures'),
      filter: ofClass('crane-legs'),
      minzoom: 15,
      paint: { 'line-color': ink.crane, 'line-width': metres(1.4) },
    },
  ];
}
