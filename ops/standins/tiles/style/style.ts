import type { StyleSpecification } from 'maplibre-gl';
import { toLngLat } from '../geography/plane';
import { MAP_START } from '../sites';
import { MAXZOOM } from '../tileSet';
import { buildingLayers, railLayers, structureLayers } from './built';
import { inlandWaterLayers, landLayers, seaLayers } from './ground';
import { labelLayers } from './labels';
import { paletteOf, type Theme } from './palette';
import { roadLayers } from './roads';

export const ATTRIBUTION = 'Merrow estuary: an invented place, drawn for Bittern’s demo';

const southWest = toLngLat([-60_000, -60_000]);
const northEast = toLngLat([60_000, 60_000]);

/**
 * The map style of a theme. It names no glyphs and no sprite: letters come from the page's own Noto Sans.
 * @param tilesUrl address of the tile server, without a trailing slash
 * @param version of the tiles, part of their address so that they may be cached for long
 */
export function mapStyle(theme: Theme, tilesUrl: string, version: string): StyleSpecification {
  const ink = paletteOf(theme);
  return {
    version: 8,
    name: `Merrow, ${theme}`,
    center: [MAP_START.longitude, MAP_START.latitude],
    zoom: MAP_START.zoom,
    sources: {
      merrow: {
        type: 'vector',
        tiles: [`${tilesUrl}/tiles/{z}/{x}/{y}.pbf?v=${version}`],
        bounds: [...southWest, ...northEast],
        minzoom: 5,
        maxzoom: MAXZOOM,
        attribution: ATTRIBUTION,
      },
    },
    layers: [
      ...seaLayers(ink),
      ...landLayers(ink),
      ...inlandWaterLayers(ink),
      ...structureLayers(ink),
      ...railLayers(ink),
      ...roadLayers(ink),
      ...buildingLayers(ink),
      ...labelLayers(ink),
    ],
  };
}
