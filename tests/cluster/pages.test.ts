import { mkdirSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import type { BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, inject, test } from 'vitest';
import { closeDb } from '#db/client';
import { config } from '#lib/config/index';
import { httpPort, webPort } from '#ops/cluster/layout';
import { killProcess } from '#ops/cluster/processes';
import { seedPlants } from '#ops/demo/plants';
import { seedDemo } from '#ops/demo/seed';
import { addressOf, type Subjects } from '#ops/pictures/pagePatterns';
import { MAP_START } from '#ops/standins/tiles/sites';
import { untilAnswers } from '#ops/start/untilAnswers';
import { signIn, useBrowser } from '../e2e/support/browser';
import { ACCESS, expectedStatus, ROLES } from '../e2e/support/pageAccess';
import { minutes, post } from '../e2e/support/posts';
import { signedInFetch } from '../e2e/support/signedInFetch';
import { someSubjects } from '../e2e/support/subjects';
import { useFreshSchema } from '../integration/support/freshSchema';
import { startBittern, stopBittern } from './support/bittern';
import { testCluster } from './support/cluster';

const isWhole = process.env['CLUSTER'] === 'whole';
const DEMO_DAYS = 9;
const MARKED_BACK_MS = 3_000;
const SLOW = { timeout: 60_000 };

useFreshSchema();
const { open } = useBrowser();
const layout = testCluster();
let subjects: Subjects;

/** Starts what does not run of webs and workers, and waits until each web answers and the proxy knows. */
async function startBoth(): Promise<void> {
  await startBittern();
  for (const number of [1, 2])
    await untilAnswers(`http://127.0.0.1:${webPort(layout, number)}/healthz`, 60_000);
  await sleep(MARKED_BACK_MS);
}

beforeAll(async () => {
  if (!isWhole) return;
  mkdirSync(config().dataDir, { recursive: true });
  const demo = { days: DEMO_DAYS, password: inject('demoPassword') };
  await seedDemo({ ...config(), demo: { ...config().demo, ...demo } }, () => undefined);
  await seedPlants(DEMO_DAYS);
  await startBoth();
  subjects = await someSubjects();
}, 900_000);

afterAll(async () => {
  await stopBittern();
  await closeDb();
}, 60_000);

test.skipIf(!isWhole)(
  'every page answers every role through the proxy as it does on one server',
  async () => {
    const unexpected: string[] = [];
    for (const role of ROLES) {
      const ask = await signedInFetch(`${role}@merrow.example`);
      for (const [pattern, access] of Object.entries(ACCESS)) {
        const expected = access === 'public' ? 200 : expectedStatus(access, role);
        const { status } = await ask('GET', addressOf(pattern, 'merrow', subjects) ?? pattern);
        if (status !== expected) unexpected.push(`${role} ${pattern}: ${status} for ${expected}`);
      }
    }
    expect(unexpected).toEqual([]);
  },
  600_000,
);

/** Somebody at work in a browser: what goes wrong on their pages is kept. */
interface Desk {
  page: Page;
  context: BrowserContext;
  wrong: string[];
}

async function deskOf(role: string): Promise<Desk> {
  const { page, context } = await open();
  await signIn(page, `${role}@merrow.example`);
  const wrong: string[] = [];
  page.on('pageerror', (error) => wrong.push(`${page.url()}: ${error.message}`));
  return { page, context, wrong };
}

/** Opens pages one after another, as one who is still signed in. */
async function openAll({ page, wrong }: Desk, paths: readonly string[]): Promise<void> {
  for (const path of paths) {
    const response = await page.goto(path);
    if (response?.status() !== 200) wrong.push(`${path}: ${response?.status()}`);
    if (page.url().includes('sign-in')) wrong.push(`${path}: signed out`);
    await page.getByRole('heading', { level: 1 }).waitFor(SLOW);
  }
}

const READ = ['/n/merrow/map', '/n/merrow/stations/MER-02', '/n/merrow/exceedances', '/n/merrow/complaints'];

test.skipIf(!isWhole)(
  'one web dies, then the other: who is signed in works on, what one web stored the other shows, and live levels go on',
  async () => {
    const operator = await deskOf('operator');
    const liaison = await deskOf('liaison');
    const regulator = await deskOf('regulator');
    const watcher = await deskOf('operator');
    const monitor = await newStation();
    await watcher.page.goto('/n/merrow/map');
    await expectLive(watcher.page, monitor, 81.4);

    expect(killProcess(layout, 'web1'), 'web1 ran').toBe(true);
    for (const desk of [operator, liaison, regulator]) await openAll(desk, READ);
    await rename(operator.page, 'Silo Lane, east');
    await expectLive(watcher.page, monitor, 82.5);

    await startBoth();
    expect(killProcess(layout, 'web2'), 'web2 ran').toBe(true);
    for (const desk of [operator, liaison, regulator]) await openAll(desk, READ);
    await openAll(liaison, ['/n/merrow/stations']);
    await liaison.page.getByText('Silo Lane, east').first().waitFor(SLOW);
    await expectLive(watcher.page, monitor, 83.6);
    await startBoth();

    for (const { context, wrong } of [operator, liaison, regulator, watcher]) {
      expect(wrong).toEqual([]);
      await context.close();
    }
  },
  600_000,
);

/** Registers a station that posts each second. @returns its token. */
async function newStation(): Promise<string> {
  const ask = await signedInFetch('operator@merrow.example');
  const { latitude, longitude } = MAP_START;
  const place = { latitude, longitude };
  const bands = { bandFraction: 1, intervalSeconds: 1, firstBandHz: 31.5, lastBandHz: 8000 };
  const station = { code: 'LIVE-1', name: 'On the quay', ...place, ...bands };
  const registered = await ask('POST', '/api/v1/networks/merrow/stations', station);
  expect(registered.status, await registered.clone().text()).toBe(201);
  return ((await registered.json()) as { token: string }).token;
}

/** Changes a station's name by its form. */
async function rename(page: Page, name: string): Promise<void> {
  await page.goto('/n/merrow/stations/MER-02/edit');
  await page.getByLabel('Name', { exact: true }).fill(name);
  await page.getByRole('button', { name: /^Save/ }).click();
  await page.waitForURL((url) => !url.pathname.endsWith('/edit'));
}

/** A monitor posts through the proxy until the open page has heard it: a stream that broke takes some seconds to be opened again. */
async function expectLive(page: Page, token: string, laeqDb: number): Promise<void> {
  const shown = page.getByRole('listitem').filter({ hasText: 'LIVE-1' });
  const hear = async () => {
    const [interval] = minutes(Math.floor(Date.now() / 1000) - 2, 1, laeqDb);
    const answer = await post(token, interval ? [{ ...interval, seconds: 1 }] : []);
    expect(answer.status, await answer.text()).toBe(200);
    return shown.innerText();
  };
  await expect.poll(hear, { ...SLOW, interval: 3_000 }).toContain(laeqDb.toFixed(1));
}

test.skipIf(!isWhole)('both webs answer, not one alone', async () => {
  const answers = await Promise.all(
    [httpPort(layout), webPort(layout, 1), webPort(layout, 2)].map((port) =>
      fetch(`http://127.0.0.1:${port}/readyz`),
    ),
  );
  expect(answers.map(({ status }) => status)).toEqual([200, 200, 200]);
});
