import { expect, test } from 'vitest';
import { picture, signIn, useBrowser } from './support/browser';
import { signedInFetch } from './support/signedInFetch';

const { open } = useBrowser();
/** How long a page may take on a busy machine. */
const SLOW = { timeout: 30_000 };

interface Statistics {
  LAeq: number;
  coverage: number;
}

test('the map: every station with its level, one chosen from the list, down to its page', async () => {
  const { page, context } = await open();
  await signIn(page, 'operator@merrow.example');
  await page.goto('/n/merrow/map');
  const list = page.getByRole('list').filter({ hasText: 'MER-01' });
  await expect.poll(() => list.getByRole('listitem').count(), SLOW).toBe(8);
  await list.getByRole('button', { name: /Silo Lane/ }).focus();
  await page.keyboard.press('Enter');
  const glance = page.getByRole('region', { name: 'Silo Lane at a glance' });
  await glance.getByText('24 h').first().waitFor();
  await picture(page, 'map');
  await glance.getByRole('link', { name: 'Open the station' }).click();
  await page.waitForURL(/\/stations\/MER-02/);
  await page.getByRole('application').waitFor();
  await context.close();
});

test('the strip: a dragged stretch gives the figures of the interface, and can be sent as a link', async () => {
  const { page, context } = await open({ width: 1280, height: 1000 });
  await signIn(page, 'operator@merrow.example');
  const day = new Date(Date.now() - 3 * 86_400_000).toISOString().slice(0, 10);
  const next = new Date(Date.now() - 2 * 86_400_000).toISOString().slice(0, 10);
  await page.goto(`/n/merrow/stations/MER-02?from=${day}T00:00&to=${next}T00:00`);
  const strip = page.getByRole('application');
  await strip.waitFor();
  const box = await strip.boundingBox();
  if (!box) throw new Error('The strip has no place.');
  const y = box.y + 200;
  await page.mouse.move(box.x + box.width * 0.4, y);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width * 0.6, y + 1, { steps: 8 });
  await page.mouse.up();
  await page.waitForURL(/#selection=/);
  const slip = page.getByRole('complementary').filter({ hasText: 'Zoom here' });
  const href = (await slip.getByRole('link', { name: 'CSV' }).getAttribute('href')) ?? '';
  const period = new URLSearchParams(href.split('?')[1]);
  const api = await signedInFetch('operator@merrow.example');
  const answer = await api('GET', `/api/v1/networks/merrow/stations/MER-02/statistics?${period.toString()}`);
  const statistics = (await answer.json()) as Statistics;
  await expect.poll(() => slip.innerText(), SLOW).toContain(statistics.LAeq.toFixed(1));
  expect(await slip.innerText()).toMatch(/\d+\s%\scovered/);
  await picture(page, 'strip-selection');

  const link = page.url();
  await page.goto('about:blank');
  await page.goto(link);
  await expect.poll(() => slip.innerText(), SLOW).toContain(statistics.LAeq.toFixed(1));
  await context.close();
});

test('the strip by keyboard: a stretch is marked, left out with a reason, and counted again', async () => {
  const { page, context } = await open({ width: 1280, height: 1000 });
  await signIn(page, 'operator@merrow.example');
  const day = new Date(Date.now() - 4 * 86_400_000).toISOString().slice(0, 10);
  await page.goto(`/n/merrow/stations/MER-03?from=${day}T00:00&to=${day}T12:00`);
  const strip = page.getByRole('application');
  await strip.waitFor();
  await strip.focus();
  for (const key of ['ArrowRight', 'ArrowRight', 'Enter', 'Shift+ArrowRight', 'Shift+ArrowRight', 'Enter']) {
    await page.keyboard.press(key);
  }
  await page.getByRole('button', { name: 'Exclude' }).click();
  await page.getByLabel('Why should it not count?').fill('A lawn mower beside the microphone');
  await page.keyboard.press('Enter');
  await page.getByText('Excluded. The data stay').waitFor();
  await page.reload();
  const exclusions = page.locator('section').filter({ hasText: 'Exclusions' });
  await exclusions.getByText('A lawn mower beside the microphone').first().waitFor();
  await picture(page, 'strip-exclusion');

  const api = await signedInFetch('operator@merrow.example');
  const listed = (await (await api('GET', `/api/v1/networks/merrow/exclusions?station=MER-03`)).json()) as {
    items: { id: number; reason: string; withdrawal?: unknown }[];
  };
  const added = listed.items.find(({ reason }) => reason === 'A lawn mower beside the microphone');
  expect(added).toBeDefined();
  const withdrawn = await api('POST', `/api/v1/networks/merrow/exclusions/${added?.id}/withdrawal`, {
    reason: 'It was another day',
  });
  expect(withdrawn.status).toBe(200);
  await context.close();
});

/** A date as its day begins by UTC. */
const dateDaysAgo = (days: number) => new Date(Date.now() - days * 86_400_000).toISOString().slice(0, 10);

test('the map through a day: the address keeps the moment and the layers, one press leads back to now', async () => {
  const { page, context } = await open();
  await signIn(page, 'regulator@merrow.example');
  await page.goto('/n/merrow/map');
  const scrub = page.getByLabel('Quarter-hour of the day');
  await page.getByLabel('Wind', { exact: true }).check();
  await page.getByLabel('Day', { exact: true }).fill(dateDaysAgo(3));
  await scrub.focus();
  await page.keyboard.press('Home');
  await page.keyboard.press('ArrowRight');
  expect(page.url()).toContain(`at=${dateDaysAgo(3)}T00:15`);
  expect(page.url()).toContain('layers=wind');
  await page.reload();
  await page.getByText('00:15 to 00:30').first().waitFor();
  await page
    .getByText(/% valid/)
    .first()
    .waitFor();
  await page.getByRole('button', { name: 'Live', exact: true }).click();
  expect(page.url()).not.toContain('at=');
  await context.close();
});

test('without WebGL the map is a plan with the same stations', async () => {
  const { page, context } = await open();
  await page.addInitScript(() => {
    HTMLCanvasElement.prototype.getContext = () => null;
  });
  await signIn(page, 'regulator@merrow.example');
  await page.goto('/n/merrow/map');
  const pane = page.locator('.map-pane');
  await expect.poll(() => pane.getByRole('button', { name: /Quay Head/ }).count(), SLOW).toBe(1);
  await pane.getByText('This browser cannot draw the map').waitFor(SLOW);
  await picture(page, 'map-without-webgl');
  await context.close();
});

test('without an answer of the tile server the map says so; stations lie where they should', async () => {
  const { page, context } = await open();
  await page.route('**/style/*.json', (route) => route.abort());
  await signIn(page, 'regulator@merrow.example');
  await page.goto('/n/merrow/map');
  await page.getByText('The map’s background cannot be fetched at the moment.').waitFor(SLOW);
  const pane = page.locator('.map-pane');
  await expect.poll(() => pane.getByRole('button', { name: /Quay Head/ }).count(), SLOW).toBe(1);
  await context.close();
});

test.each([
  '/n/merrow/stations?from=yesterday&to=never',
  '/n/merrow/exceedances?from=yesterday&to=never',
  '/n/merrow/stations/MER-02?from=2026-03-01T00:00&to=2020-01-01T00:00',
  '/n/merrow/stations/NO-SUCH',
  '/n/merrow/nothing',
])('a wrong address is told clearly: %s', async (path) => {
  const { page, context } = await open();
  await signIn(page, 'operator@merrow.example');
  const answer = await page.goto(path);
  expect(answer?.status()).toBeGreaterThanOrEqual(400);
  expect(answer?.status()).toBeLessThan(500);
  expect((await page.getByRole('heading', { level: 1 }).innerText()).length).toBeGreaterThan(5);
  await context.close();
});
