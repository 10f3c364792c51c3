import { expect, test } from 'vitest';
import { signIn, useBrowser } from './support/browser';

const { open } = useBrowser();
const LIVE = '**/api/v1/networks/merrow/live';
const AGAIN_WITHIN = { timeout: 40_000 };

test('a page whose live stream was refused, as while a web starts, opens it again by itself', async () => {
  const { page, context } = await open({ width: 1280, height: 900 });
  await signIn(page, 'operator@merrow.example');
  let asked = 0;
  let heard = 0;
  await page.route(LIVE, async (route) => {
    asked += 1;
    if (asked === 1) await route.fulfill({ status: 503, body: '' });
    else await route.continue();
  });
  page.on('response', (response) => {
    if (response.url().endsWith('/live') && response.ok()) heard += 1;
  });
  await page.goto('/n/merrow/map');
  await expect.poll(() => asked, AGAIN_WITHIN).toBe(2);
  await expect.poll(() => heard, AGAIN_WITHIN).toBe(1);
  await context.close();
});
