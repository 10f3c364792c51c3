import { findNetworkById } from '#db/queries/networks';
import { changeReportForm } from '#lib/services/reports/formSettings';
import { median, percentile, printTable } from './support/measure';
import { FIRST_SEC, fillMonth, MONTH_SEC, repeatMonth } from './support/months';
import { withOwnSchema } from './support/schema';
import { makeNetwork, makeStation } from './support/station';
import { dragOver, framesWhile, watchStrip, type Seen } from './support/stripProbe';
import { Visitor } from './support/visitor';
import { Web } from './support/web';

/**
 * What a person at a browser waits for, in headless Chromium on loopback against the built web (`bash ops/build.sh` first), every
 * visit with nothing cached: the strip of a month of minutes and of a year, panning, zooming, a selection, and the size of scripts.
 * `npx tsx ops/bench/browser.ts`, about 2 min.
 */
const VISITS = 5;
const DRAGS = 5;
const VISIT_TIMEOUT_MS = 60_000;

const date = (sec: number) => new Date(sec * 1000).toISOString().slice(0, 10);
const pathOf = (lengthSec: number) =>
  `/n/bench/stations/MINUTES?from=${date(FIRST_SEC)}&to=${date(FIRST_SEC + lengthSec)}`;
const MONTH = pathOf(MONTH_SEC);
const YEAR = pathOf(12 * MONTH_SEC);

const rows: string[][] = [];
const note = (what: string, measured: number, target: string, unit: string) =>
  rows.push([what, `${Math.round(measured * 1000) / 1000} ${unit}`, target]);

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const station = await makeStation(networkId, 'MINUTES', 60);
  await fillMonth(station);
  await repeatMonth(station);
  const web = await Web.start();
  const visitor = await Visitor.start(networkId, web.origin);
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
  printTable(['what', 'median', 'target'], rows);
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
      for (const act of ['pan', 'zoom'] as const) {
        const frames = await page.evaluate(framesWhile, act);
        note(
          `${act}: frames a second`,
          1000 / (frames.reduce((a, b) => a + b, 0) / frames.length),
          '≥ 50',
          '',
        );
        note(`${act}: longest of 20 frames`, percentile(frames, 0.95), '', 'ms');
      }
      const drags = [];
      for (let n = 0; n < DRAGS; n += 1) {
        await page.keyboard.press('Escape');
        drags.push(await page.evaluate(dragOver));
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

async function openReportForm(networkId: number, userId: string): Promise<void> {
  const network = await findNetworkById(networkId);
  if (!network) throw new Error('The network that was added is not there.');
  await changeReportForm(userId, network, { isOpen: true, keeper: 'Bench', areas: [] });
}

async function noteSizes(visitor: Visitor): Promise<void> {
  const pages: [name: string, path: string, mostKb: number, isSignedIn?: boolean][] = [
    ['sign-in', '/sign-in', 30, false],
    ['public form', '/report/bench', 30, false],
    ['list of stations', '/n/bench/stations', 120],
    ['strip', MONTH, 330],
    ['map with its worker', '/n/bench/map', 560],
  ];
  for (const [name, path, mostKb, isSignedIn] of pages) {
    note(
      `scripts, gzipped: ${name}`,
      (await visitor.scriptBytes(path, isSignedIn)) / 1000,
      `≤ ${mostKb}`,
      'KB',
    );
  }
}
