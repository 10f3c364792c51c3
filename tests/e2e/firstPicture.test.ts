import { type Page } from 'playwright-core';
import { expect, test } from 'vitest';
import { picture, signIn, useBrowser } from './support/browser';

const { open } = useBrowser();
/** How long a page may take on a busy machine. */
const SLOW = { timeout: 30_000 };

const dateDaysAgo = (days: number) => new Date(Date.now() - days * 86_400_000).toISOString().slice(0, 10);
const STATION = `/n/merrow/stations/MER-02?from=${dateDaysAgo(3)}T00:00&to=${dateDaysAgo(2)}T00:00`;

/** The picture of the strip as it stands: how much of it is drawn on, and its colours at a few places of the spectrogram. */
const drawn = (page: Page) =>
  page.evaluate(() => {
    const canvas = document.querySelector<HTMLCanvasElement>('[data-strip] canvas');
    const context = canvas?.getContext('2d');
    if (!canvas || !context) return null;
    const at = (share: number, y: number) => [
      ...context.getImageData(Math.round(canvas.width * share), y, 1, 1).data,
    ];
    return { size: [canvas.width, canvas.height], colours: [at(0.3, 60), at(0.5, 120), at(0.8, 200)] };
  });

for (const theme of ['light', 'dark'] as const) {
  test(`the first picture needs none of the strip’s own scripts, and is the strip’s: ${theme}`, async () => {
    const { page, context } = await open({ width: 1280, height: 1000, theme });
    const problems: string[] = [];
    page.on('pageerror', ({ message }) => problems.push(message));
    page.on('console', (message) => message.type() === 'error' && problems.push(message.text()));
    await signIn(page, 'operator@merrow.example');

    const scripts = '**/_astro/Strip.*.js';
    await page.route(scripts, (route) => route.abort());
    await page.goto(STATION);
    await expect.poll(async () => (await drawn(page))?.colours[1]?.[3], SLOW).toBe(255);
    const first = await drawn(page);
    expect(await page.getByRole('application').count()).toBe(0);
    expect(await page.locator('aside.slip').textContent()).toContain('covered');
    await picture(page, `first-picture-${theme}`);

    await page.unroute(scripts);
    problems.length = 0;
    await page.reload();
    await page.getByRole('application').waitFor(SLOW);
    await expect.poll(() => page.getByText(/dB \(Z\) a band/).count(), SLOW).toBe(1);
    await expect.poll(() => drawn(page), SLOW).toEqual(first);
    expect(problems).toEqual([]);
    await context.close();
  });
}

test('a marked stretch in the address is marked from the start', async () => {
  const { page, context } = await open();
  await signIn(page, 'operator@merrow.example');
  await page.goto(STATION);
  const strip = page.getByRole('application');
  await strip.focus();
  for (const key of ['ArrowRight', 'Enter', 'Shift+ArrowRight', 'Enter']) await page.keyboard.press(key);
  await page.waitForURL(/#selection=/);
  const { hash } = new URL(page.url());
  await page.reload();
  await page.getByRole('button', { name: 'Clear the selection' }).waitFor(SLOW);
  expect(new URL(page.url()).hash).toBe(hash);
  await context.close();
});
