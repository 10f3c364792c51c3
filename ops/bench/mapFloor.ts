import { createReadStream } from 'node:fs';
import { createServer } from 'node:http';
import { type AddressInfo } from 'node:net';
import { pipeline } from 'node:stream/promises';
import { type Browser } from 'playwright-core';
import { launchChromium } from '#ops/chromium';
import { median, printTable } from './support/measure';

/**
 * What no map page of the library can undercut on this machine: a page that holds nothing but the library and a map as large as
 * Bittern's, until it first rests, with an empty style and with the tile stand-in's (BITTERN_TILES_PORT). No Bittern, no stations.
 * `npx tsx ops/bench/mapFloor.ts`, about 1 min.
 */
const VISITS = 5;
/** As `Visitor` waits: a new window of the browser is busy with itself for a while. */
const SETTLES_MS = 2500;
const EMPTY = { version: 8, sources: {}, layers: [] };
const TILES = `http://127.0.0.1:${process.env['BITTERN_TILES_PORT'] ?? 4331}/style/light.json`;

const files: Record<string, string> = {
  mjs: 'text/javascript',
  css: 'text/css',
};

const page = (style: unknown, at: string) => `<!doctype html><meta charset="utf-8"><title>Map</title>
<link rel="stylesheet" href="/maplibre-gl.css"><div id="map" style="width:734px;height:634px"></div>
<script type="module">
import { Map, setWorkerUrl } from '/maplibre-gl.mjs';
setWorkerUrl('/maplibre-gl-worker.mjs');
const map = new Map({ container: 'map', style: ${JSON.stringify(style)}, fadeDuration: 0, ${at} });
map.once('idle', () => performance.mark('map-idle'));
</script>`;

const pages: Record<string, string> = {
  '/empty': page(EMPTY, ''),
  '/tiles': page(TILES, 'center: [1.56, 54.04], zoom: 11'),
};

const server = createServer((request, response) => {
  const path = new URL(request.url ?? '/', 'http://127.0.0.1').pathname;
  const html = pages[path];
  const type = files[path.split('.').at(-1) ?? ''];
  if (html) response.setHeader('content-type', 'text/html').end(html);
  else if (!type) response.writeHead(404).end();
  else {
    response.setHeader('content-type', type);
    pipeline(createReadStream(`node_modules/maplibre-gl/dist${path}`), response).catch(() =>
      response.destroy(),
    );
  }
});

async function idleMs(browser: Browser, url: string): Promise<number> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 860 } });
  try {
    const visited = await context.newPage();
    await visited.waitForTimeout(SETTLES_MS);
    await visited.goto(url);
    const found = await visited.waitForFunction(() => performance.getEntriesByName('map-idle')[0]?.startTime);
    return (await found.jsonValue()) ?? NaN;
  } finally {
    await context.close();
  }
}

await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
const origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
const browser = await launchChromium();
const rows: string[][] = [];
try {
  for (const path of Object.keys(pages)) {
    const times: number[] = [];
    for (let visit = 0; visit < VISITS; visit += 1) times.push(await idleMs(browser, `${origin}${path}`));
    rows.push([path.slice(1), ...times.map((ms) => ms.toFixed(0)), median(times).toFixed(0)]);
  }
} finally {
  await browser.close();
  server.close();
}
printTable(['style', ...Array.from({ length: VISITS }, (_, at) => `visit ${at + 1}`), 'median ms'], rows);
