import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { gunzipSync } from 'node:zlib';
import { VectorTile } from '@mapbox/vector-tile';
import { validateStyleMin, type StyleSpecification } from '@maplibre/maplibre-gl-style-spec';
import { PbfReader } from 'pbf';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { tilesApp } from '#ops/standins/tiles/app';
import { LAYERS } from '#ops/standins/tiles/geography/feature';
import { merrowEstuary } from '#ops/standins/tiles/geography/index';
import { STATION_SITES } from '#ops/standins/tiles/sites';
import { TileSet } from '#ops/standins/tiles/tileSet';

let server: Server;
let origin: string;
let tiles: TileSet;

beforeAll(async () => {
  tiles = new TileSet(merrowEstuary());
  server = createServer(tilesApp(tiles, () => origin));
  // Longer than a whole set takes to make: fetch keeps its connection.
  server.keepAliveTimeout = 60_000;
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
});

afterAll(async () => {
  server.closeAllConnections();
  await new Promise((closed) => server.close(closed));
});

/** Number of the tile that holds a place (Web Mercator). */
function tileAt(z: number, { latitude, longitude }: { latitude: number; longitude: number }) {
  const n = 2 ** z;
  const sine = Math.sin((latitude * Math.PI) / 180);
  const x = Math.floor(((longitude + 180) / 360) * n);
  const y = Math.floor((0.5 - Math.log((1 + sine) / (1 - sine)) / (4 * Math.PI)) * n);
  return { x, y };
}

const readStyle = async (theme: string) =>
  (await (await fetch(`${origin}/style/${theme}.json`)).json()) as StyleSpecification;

test.each(['light', 'dark'])(
  'the %s style is valid, names only layers that tiles have, and no font server',
  async (theme) => {
    const style = await readStyle(theme);
    // The validator wants a glyph server beside text; the page's own font is used instead.
    const problems = validateStyleMin(style).filter(({ message }) => !message.includes('glyphs'));
    expect(problems.map(({ message }) => message)).toEqual([]);
    expect(style.glyphs).toBeUndefined();
    expect(style.sprite).toBeUndefined();
    const named = new Set(
      style.layers.flatMap((layer) => ('source-layer' in layer ? [layer['source-layer']] : [])),
    );
    for (const name of named) expect(LAYERS).toContain(name);
    expect(named.size).toBe(LAYERS.length);
  },
);

describe('tiles', () => {
  test.each([8, 11, 13, 14, 16])('around every station there is something to see at zoom %i', async (z) => {
    for (const site of STATION_SITES) {
      const { x, y } = tileAt(z, site);
      const answer = await fetch(`${origin}/tiles/${z}/${x}/${y}.pbf`);
      expect(answer.status, `${site.code} at ${z}`).toBe(200);
      const tile = new VectorTile(new PbfReader(new Uint8Array(await answer.arrayBuffer())));
      const features = Object.values(tile.layers).reduce((sum, layer) => sum + layer.length, 0);
      expect(features, `${site.code} at ${z}`).toBeGreaterThan(0);
    }
  });

  test('the port’s tile has water, rail, roads and buildings in 4096 units, sent packed', async () => {
    const { x, y } = tileAt(13, { latitude: quay().latitude, longitude: quay().longitude });
    const answer = await fetch(`${origin}/tiles/13/${x}/${y}.pbf`);
    expect(answer.headers.get('content-type')).toBe('application/vnd.mapbox-vector-tile');
    expect(answer.headers.get('content-encoding')).toBe('gzip');
    const { layers } = new VectorTile(new PbfReader(new Uint8Array(await answer.arrayBuffer())));
    expect(Object.keys(layers)).toEqual(expect.arrayContaining(['water', 'rail', 'roads', 'buildings']));
    expect(layers['water']?.extent).toBe(4096);
    expect(layers['water']?.feature(0).loadGeometry().flat().length).toBeGreaterThan(3);
  });

  test('made twice they are the same, so that they may be cached under their version', () => {
    const again = new TileSet(merrowEstuary());
    expect(again.version).toBe(tiles.version);
    const { x, y } = tileAt(14, quay());
    const [one, other] = [tiles, again].map((set) => set.gzippedTile(14, x, y));
    if (!one || !other) throw new Error('The tile of the quay is empty.');
    expect(gunzipSync(one).equals(gunzipSync(other))).toBe(true);
  });

  test('are kept for long under their version, briefly without', async () => {
    const style = await readStyle('light');
    const { x, y } = tileAt(12, quay());
    const source = style.sources['merrow'];
    const template = source && 'tiles' in source ? source.tiles?.[0] : undefined;
    const versioned = template?.replace('{z}', '12').replace('{x}', `${x}`).replace('{y}', `${y}`) ?? '';
    expect((await fetch(versioned)).headers.get('cache-control')).toContain('immutable');
    const bare = await fetch(`${origin}/tiles/12/${x}/${y}.pbf?v=other`);
    expect(bare.headers.get('cache-control')).toBe('public, max-age=300');
  });

  test.each([
    '/tiles/3/9/0.pbf',
    '/tiles/a/0/0.pbf',
    '/tiles/-1/0/0.pbf',
    '/tiles/23/0/0.pbf',
    '/style/blue.json',
    '/x',
  ])('%s is nothing', async (path) => {
    const answer = await fetch(`${origin}${path}`);
    expect(answer.status).toBe(404);
    expect(answer.headers.get('content-type')).toContain('text/plain');
  });
});

function quay() {
  const site = STATION_SITES.find(({ code }) => code === 'MER-01');
  if (!site) throw new Error('There is no MER-01.');
  return site;
}
