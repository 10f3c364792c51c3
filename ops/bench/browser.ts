import { type Page } from 'playwright-core';
import { findNetworkById } from '#db/queries/networks';
import { changeReportForm } from '#lib/services/reports/formSettings';
import { median, percentile } from './support/measure';
import { FIRST_SEC, fillMonth, MONTH_SEC, repeatMonth } from './support/months';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';
import { dragOver, framesWhile, watchStrip, type Seen } from './support/stripProbe';
import { Visitor } from './support/visitor';
import { Web } from './support/web';

/**
 * What a person at a browser waits for, in headless Chromium on loopback against the built web (`bash ops/build.sh` first), every
 * visit with nothing cached: the strip of a month of minutes and of a year, panning, zooming, a selection, and the size of scripts.
 * There is no GPU: pages are drawn by the processor, and so is the map's WebGL.
 * `npx tsx ops/bench/browser.ts`, about 2 min.
 */
const VISITS = 3;
const DRAGS = 5;
const VISIT_TIMEOUT_MS = 60_000;

const date = (sec: number) => new Date(sec * 1000).toISOString().slice(0, 10);
const pathOf = (lengthSec: number) =>
  `/n/bench/stations/MINUTES?from=${date(FIRST_SEC)}&to=${date(FIRST_SEC + lengthSec)}`;
const MONTH = pathOf(MONTH_SEC);
const YEAR = pathOf(12 * MONTH_SEC);

/** A row at once, so that a run that is cut short has told what it measured. */
const note = (what: string, measured: number, target: string, unit: string) =>
  console.log(`| ${what} | ${Math.round(measured * 1000) / 1000} ${unit} | ${target} |`);

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'MINUTES', 60);
  await fillMonth(station);
  await repeatMonth(station);
  const web = await Web.start();
  const visitor = await Visitor.start(networkId, web.origin);
  console.log('| what | median | target |\n| --- | --- | --- |');
  try {
    await noteVisits(visitor, 'month', MONTH, ['≤ 1,000', '≤ 1,500']);
    await noteVisits(visitor, 'year', YEAR, ['≤ 2,000', '≤ 2,000']);
    await noteMoves(visitor);
    await openReportForm(networkId, visitor.userId);
    await noteSizes(visitor);
  } finally {
    await visitor.stop();
    await web.stop();
  }
  console.log('');
});

async function noteVisits(
  visitor: Visitor,
  name: string,
  path: string,
  targets: [string, string],
): Promise<void> {
  const visits: Seen[] = [];
  // The first one warms the server, not the browser.
  for (let n = 0; n <= VISITS; n += 1) {
    const seen = await visitor.visit(
      async (page) => {
        await page.goto(path);
        await page.waitForFunction(() => (window.seen?.completeMs ?? null) !== null, null, {
          timeout: VISIT_TIMEOUT_MS,
        });
        return page.evaluate(() => window.seen);
      },
      { script: watchStrip },
    );
    if (seen && n > 0) visits.push(seen);
  }
  note(
    `${name}: spectrogram painted`,
    median(visits.map(({ paintedMs }) => paintedMs ?? NaN)),
    targets[0],
    'ms',
  );
  note(
    `${name}: complete with the server's figures`,
    median(visits.map(({ completeMs }) => completeMs ?? NaN)),
    targets[1],
    'ms',
  );
  note(`${name}: layout shift`, Math.max(...visits.map(({ layoutShift }) => layoutShift)), '0', '(highest)');
}

async function noteMoves(visitor: Visitor): Promise<void> {
  await visitor.visit(
    async (page) => {
      await page.goto(MONTH);
      await page.waitForFunction(() => (window.seen?.completeMs ?? null) !== null, null, {
        timeout: VISIT_TIMEOUT_MS,
      });
      // What is seen first is a picture; the strip itself follows.
      await page.waitForSelector('[role="application"] canvas');
      await page.waitForLoadState('networkidle');
      const cpuMs = await mainThread(page);
      for (const act of ['pan', 'zoom'] as const) {
        const beforeMs = await cpuMs();
        const frames = await page.evaluate(framesWhile, act);
        const perFrameMs = ((await cpuMs()) - beforeMs) / frames.length;
        note(
          `${act}: frames a second`,
          1000 / (frames.reduce((a, b) => a + b, 0) / frames.length),
          '≥ 50',
          '',
        );
        note(`${act}: longest of 20 frames`, percentile(frames, 0.95), '', 'ms');
        note(`${act}: processor time of the page a frame`, perFrameMs, '≤ 20', 'ms');
      }
      const drags = [];
      for (let n = 0; n < DRAGS; n += 1) {
        await page.keyboard.press('Escape');
        drags.push(await page.evaluate(dragOver, 0.5 + n / 20));
      }
      note(
        'selection: frames until its local figures',
        Math.max(...drags.map((d) => d.localFrames)),
        '1',
        '(highest)',
      );
      note('selection: its local figures', median(drags.map((d) => d.localMs)), '', 'ms');
      note(
        "selection: the server's figures after letting go",
        median(drags.map((d) => d.serverMs)),
        '≤ 150',
        'ms',
      );
    },
    { script: watchStrip },
  );
}

/** Answers how to ask for the processor time that the page's main thread has taken, ms: it does not depend on what else runs. */
async function mainThread(page: Page): Promise<() => Promise<number>> {
  const client = await page.context().newCDPSession(page);
  await client.send('Performance.enable', { timeDomain: 'threadTicks' });
  return async () => {
    const { metrics } = await client.send('Performance.getMetrics');
    return (metrics.find(({ name }) => name === 'TaskDuration')?.value ?? NaN) * 1000;
  };
}

async function openReportForm(networkId: number, userId: string): Promise<void> {
  const network = await findNetworkById(networkId);
  if (!network) throw new Error('The network that was added is not there.');
  await changeReportForm(userId, network, { isOpen: true, keeper: 'Bench', areas: [] });
}

async function noteSizes(visitor: Visitor): Promise<void> {
  const pages: { name: string; path: string; mostKb: number; until: string; isSignedIn?: boolean }[] = [
    { name: 'sign-in', path: '/sign-in', mostKb: 30, until: 'form', isSignedIn: false },
    { name: 'public form', path: '/report/bench', mostKb: 30, until: 'form', isSignedIn: false },
    { name: 'list of stations', path: '/n/bench/stations', mostKb: 120, until: 'table' },
    { name: 'strip', path: MONTH, mostKb: 330, until: '[role="application"] canvas' },
    { name: 'map with its worker', path: '/n/bench/map', mostKb: 560, until: 'canvas.maplibregl-canvas' },
  ];
  for (const { name, mostKb, ...page } of pages) {
    note(`scripts, gzipped: ${name}`, (await visitor.scriptBytes(page)) / 1000, `≤ ${mostKb}`, 'KB');
  }
}
