import express, { type Express } from 'express';
import { ATTRIBUTION, mapStyle } from './style/style';
import type { Theme } from './style/palette';
import type { TileSet } from './tileSet';

const THEMES: readonly Theme[] = ['light', 'dark'];
const MOST_ZOOM = 22;
const YEAR_SEC = 365 * 24 * 3600;

/** Whole numbers that name a tile which exists at that zoom; null otherwise. */
function tileNumbers(texts: readonly unknown[]): [z: number, x: number, y: number] | null {
  const [z = -1, x = -1, y = -1] = texts.map((text) =>
    typeof text === 'string' && /^\d{1,8}$/.test(text) ? Number(text) : -1,
  );
  const isTile = z >= 0 && z <= MOST_ZOOM && x >= 0 && x < 2 ** z && y >= 0 && y < 2 ** z;
  return isTile ? [z, x, y] : null;
}

/**
 * The tile server: vector tiles and map styles of the invented Merrow estuary.
 * @param tilesUrl gives the address that browsers reach it at, without a trailing slash
 */
export function tilesApp(tiles: TileSet, tilesUrl: () => string): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use((_, response, next) => {
    response.set({
      'Access-Control-Allow-Origin': '*',
      'Cross-Origin-Resource-Policy': 'cross-origin',
      'X-Content-Type-Options': 'nosniff',
    });
    next();
  });

  app.get('/healthz', (_, response) => {
    response.set('Cache-Control', 'no-store').json({ status: 'ok', version: tiles.version });
  });

  app.get('/attribution', (_, response) => {
    response.type('text/plain; charset=utf-8').send(`${ATTRIBUTION}\n`);
  });

  for (const theme of THEMES) {
    app.get(`/style/${theme}.json`, (_, response) => {
      response.set('Cache-Control', 'no-cache').json(mapStyle(theme, tilesUrl(), tiles.version));
    });
  }

  app.get('/tiles/:z/:x/:y.pbf', (request, response) => {
    const numbers = tileNumbers([request.params.z, request.params.x, request.params.y]);
    if (!numbers) {
      response.status(404).type('text/plain; charset=utf-8').send('There is no tile of that number.\n');
      return;
    }
    const isOfThisVersion = request.query['v'] === tiles.version;
    response.set(
      'Cache-Control',
      isOfThisVersion ? `public, max-age=${YEAR_SEC}, immutable` : 'public, max-age=300',
    );
    const tile = tiles.gzippedTile(...numbers);
    if (!tile) {
      response.status(204).end();
      return;
    }
    response
      .set({ 'Content-Type': 'application/vnd.mapbox-vector-tile', 'Content-Encoding': 'gzip' })
      .send(tile);
  });

  app.use((_, response) => {
    response
      .status(404)
      .type('text/plain; charset=utf-8')
      .send('Nothing is here. Try /style/light.json, /style/dark.json or /tiles/{z}/{x}/{y}.pbf.\n');
  });
  return app;
}
