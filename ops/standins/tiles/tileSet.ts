import { createHash } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { GeoJSONVT, type GeoJSONVTTile } from '@maplibre/geojson-vt';
import { fromGeojsonVt } from '@maplibre/vt-pbf';
import type { Feature } from 'geojson';
import { LAYERS, type LayerName, type MapFeature } from './geography/feature';

/** Deepest zoom that is cut into tiles of its own; maps enlarge these beyond it. */
export const MAXZOOM = 16;
const MOST_KEPT_TILES = 3000;

/** The features of one layer that appear together: cut once, asked for at every zoom of their range. */
interface Sheet {
  layer: LayerName;
  minzoom: number;
  maxzoom: number;
  cutter: GeoJSONVT;
}

/** Mapbox Vector Tiles (version 2) of a set of features, made when first asked for. */
export class TileSet {
  /** Changes whenever any feature does, so that tiles may be cached for long under it. */
  readonly version: string;
  private readonly sheets: Sheet[];
  private readonly kept = new Map<string, Buffer | null>();

  constructor(features: readonly MapFeature[]) {
    const groups = new Map<string, { from: MapFeature; features: Feature[] }>();
    const digest = createHash('sha256');
    for (const from of features) {
      const key = `${from.layer} ${from.minzoom} ${from.maxzoom ?? MAXZOOM}`;
      const group = groups.get(key) ?? { from, features: [] };
      group.features.push(from.feature);
      groups.set(key, group);
      digest.update(key).update(JSON.stringify(from.feature));
    }
    this.version = digest.digest('hex').slice(0, 12);
    this.sheets = [...groups.values()].map(({ from, features: members }) => ({
      layer: from.layer,
      minzoom: from.minzoom,
      maxzoom: from.maxzoom ?? MAXZOOM,
      cutter: new GeoJSONVT(
        { type: 'FeatureCollection', features: members },
        { maxZoom: MAXZOOM, tolerance: 3, buffer: 128, indexMaxZoom: 6 },
      ),
    }));
  }

  /** A tile, gzipped; null where nothing is drawn. */
  gzippedTile(z: number, x: number, y: number): Buffer | null {
    const key = `${z}/${x}/${y}`;
    const kept = this.kept.get(key);
    if (kept !== undefined) return kept;
    const made = this.make(z, x, y);
    if (this.kept.size >= MOST_KEPT_TILES) this.kept.clear();
    this.kept.set(key, made);
    return made;
  }

  private make(z: number, x: number, y: number): Buffer | null {
    const layers: Partial<Record<LayerName, GeoJSONVTTile>> = {};
    for (const layer of LAYERS) {
      const cut = this.sheets
        .filter((sheet) => sheet.layer === layer && z >= sheet.minzoom && z <= sheet.maxzoom)
        .flatMap((sheet) => sheet.cutter.getTile(z, x, y) ?? []);
      const features = cut.flatMap((tile) => tile.features);
      const first = cut[0];
      if (first && features.length > 0) layers[layer] = { ...first, features } as GeoJSONVTTile;
    }
    if (Object.keys(layers).length === 0) return null;
    return gzipSync(fromGeojsonVt(layers as Record<string, GeoJSONVTTile>, { version: 2, extent: 4096 }));
  }
}
