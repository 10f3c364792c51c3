import { type Page } from 'playwright-core';
import { pool } from '#db/queries/connection';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { networkLevels } from '#lib/services/map/levels';
import { median, msOf } from './support/measure';
import { makeMonitors, postOf, send, sendAll, type Monitor } from './support/monitors';
import { withOwnSchema } from './support/schema';
import { invent, makeNetwork } from './support/station';
import { Visitor } from './support/visitor';
import { Web } from './support/web';

/**
 * The map of 300 stations in headless Chromium on loopback against the built web (`bash ops/build.sh` first) and the tile stand-in
 * that a running Bittern serves (BITTERN_TILES_PORT): how long until it rests, how long a level takes from its acknowledgement to the
 * page, and a day of the network for the scrubbing. `npx tsx ops/bench/map.ts`, about 2 min.
 */
const STATIONS = 300;
const VISITS = 3;
const POSTS = 5;
const TIMEOUT_MS = 120_000;
const PATH = '/n/bench/map';

const note = (what: string, measured: number, target: string) =>
  console.log(`| ${what} | ${Math.round(measured).toLocaleString('en-GB')} | ${target} |`);

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const monitors = await makeMonitors(networkId, 'B', STATIONS);
  await spread(networkId);
  const web = await Web.start();
  const visitor = await Visitor.start(networkId, web.origin);
  try {
    const post = postOf(await invent(lastMinuteSec() - 30 * 60, 30, 60));
    await sendAll(
      web.origin,
      monitors,
      monitors.map(() => [post]),
    );
    console.log('| what | ms | target |\n| --- | --- | --- |');
    await noteIdle(visitor);
    await noteLive(visitor, web.origin, monitors);
    await noteDay(networkId);
  } finally {
    await visitor.stop();
    await web.stop();
  }
});

/** Stations on a grid of about 1.3 km by 0.6 km a step. */
async function spread(networkId: number): Promise<void> {
  await pool()('stations')
    .where({ network_id: networkId })
    .update({
      latitude: pool().raw('54 + (id % 20) * 0.006'),
      longitude: pool().raw('1.5 + (id DIV 20) * 0.02'),
    });
}

async function noteIdle(visitor: Visitor): Promise<void> {
  const idles: number[] = [];
  // The first one warms the server, not the browser.
  for (let n = 0; n <= VISITS; n += 1) {
    const idleMs = await visitor.visit(async (page) => {
      await page.goto(PATH);
      return untilIdle(page);
    });
    if (n > 0) idles.push(idleMs);
  }
  note(`map of ${STATIONS} stations idle, nothing cached`, median(idles), '≤ 1,500');
}

/** Milliseconds from the beginning of the visit until the map first rested. */
async function untilIdle(page: Page): Promise<number> {
  const found = await page.waitForFunction(
    () => performance.getEntriesByName('map-idle')[0]?.startTime ?? null,
    null,
    { timeout: TIMEOUT_MS },
  );
  return (await found.jsonValue()) ?? NaN;
}

async function noteLive(visitor: Visitor, origin: string, monitors: readonly Monitor[]): Promise<void> {
  const delays = await visitor.visit(async (page) => {
    await page.goto(PATH);
    await untilIdle(page);
    const found: number[] = [];
    for (let n = 0; n < POSTS; n += 1) {
      const monitor = monitors[n];
      if (!monitor) throw new Error('There are too few monitors.');
      found.push(await delayOf(page, origin, monitor, 90 + n));
    }
    return found;
  });
  note('a level on the page after its post was acknowledged, median', median(delays), '');
  note('the same, longest of five', Math.max(...delays), '≤ 2,000');
}

/** Milliseconds from the answer to a post until its level (dB, one that no other station has) stands in the list. */
async function delayOf(page: Page, origin: string, monitor: Monitor, levelDb: number): Promise<number> {
  const [interval] = await invent(lastMinuteSec(), 1, 60);
  if (!interval) throw new Error('No interval was made.');
  const extremes = { lafmaxCentiDb: null, lafminCentiDb: null };
  await send(origin, monitor, postOf([{ ...interval, ...extremes, laeqCentiDb: levelDb * 100 }]));
  const acknowledgedMs = performance.now();
  await page.waitForFunction(
    (text) => document.querySelector('main')?.textContent?.includes(text),
    `${levelDb}.0 dB`,
    {
      timeout: TIMEOUT_MS,
      polling: 20,
    },
  );
  return performance.now() - acknowledgedMs;
}

/** Beginning of the last whole minute, epoch seconds. */
function lastMinuteSec(): number {
  return Math.floor(Date.now() / 60_000) * 60 - 60;
}

/** A day of which each station has half an hour that nothing has been computed of: the dearest way, from intervals. */
async function noteDay(networkId: number): Promise<void> {
  const toSec = quarterAt(Date.now() / 1000) + QUARTER_SEC;
  const span = { fromSec: toSec - 96 * QUARTER_SEC, toSec };
  const times: number[] = [];
  for (let n = 0; n <= VISITS; n += 1) times.push(await msOf(() => networkLevels(networkId, span)));
  note('levels of a day of the network, its intervals not computed yet', median(times.slice(1)), '');
}
