import { beforeAll, expect, inject, test } from 'vitest';
import { addressOf, pagePatterns, type Subjects } from '#ops/pictures/pagePatterns';
import { scriptHash } from '#ops/http/contentSecurity';
import { signIn, useBrowser } from './support/browser';
import { signedInFetch } from './support/signedInFetch';
import { someSubjects } from './support/subjects';
import { inTabs } from './support/tabs';

const { open } = useBrowser();
let addresses: string[];

beforeAll(async () => {
  const subjects: Subjects = await someSubjects();
  addresses = pagePatterns()
    .filter((pattern) => !/^\/(sign-out|theme|500|n\/\[network\]\/summaries\/mark)/.test(pattern))
    .flatMap((pattern) => addressOf(pattern, 'merrow', subjects) ?? []);
  expect(addresses.length).toBeGreaterThan(60);
}, 60_000);

test('every script that stands in a page is one that the policy names', async () => {
  const ask = await signedInFetch('admin@merrow.example');
  const wrong: string[] = [];
  let inlineCount = 0;
  for (const address of addresses) {
    const answer = await ask('GET', address);
    if (!answer.headers.get('content-type')?.startsWith('text/html')) continue;
    const policy = answer.headers.get('content-security-policy') ?? '';
    expect(/script-src ([^;]+)/.exec(policy)?.[1], address).not.toContain('unsafe');
    const html = await answer.text();
    for (const [, attributes = '', text = ''] of html.matchAll(/<script\b([^>]*)>([\s\S]*?)<\/script>/gi)) {
      if (/\bsrc=|application\/json/.test(attributes)) continue;
      inlineCount += 1;
      if (!policy.includes(scriptHash(text))) wrong.push(`${address}: ${text.slice(0, 80)}`);
    }
    if (/<[^>]+\son[a-z]+=["']/i.test(html)) wrong.push(`${address}: a handler in an attribute`);
  }
  expect(wrong).toEqual([]);
  // The strip, the map and the spectrum wake islands.
  expect(inlineCount).toBeGreaterThan(4);
}, 300_000);

test('no page does what its policy forbids', async () => {
  const { page, context } = await open();
  const refused: string[] = [];
  await signIn(page, 'admin@merrow.example');
  context.on('console', (message) => {
    if (/Content Security Policy/i.test(message.text()))
      refused.push(`${message.page()?.url()}: ${message.text()}`);
  });
  context.on('weberror', (error) => refused.push(`${error.page()?.url()}: ${error.error().message}`));
  await inTabs(page, addresses, async (tab, address) => {
    const answer = await tab.goto(address, { waitUntil: 'load' }).catch(() => null);
    // A file to download is no page.
    if (answer) await tab.waitForTimeout(300);
  });
  expect(refused).toEqual([]);
  await context.close();
}, 900_000);

test('under the policy the strip draws, the map works and colours change at once', async () => {
  const { page, context } = await open();
  await signIn(page, 'operator@merrow.example');
  const code = (await someSubjects())['[code]'];
  await page.goto(`/n/merrow/stations/${code}`);
  await page.locator('canvas').first().waitFor();
  expect(await page.evaluate(() => typeof (window as { earlyAnswers?: unknown }).earlyAnswers)).toBe(
    'object',
  );
  await page.goto('/n/merrow/map');
  // Tiles are drawn by a worker, whose file the policy must let start.
  await page.locator('canvas.maplibregl-canvas').waitFor();
  await expect.poll(() => page.workers().length, { timeout: 20_000 }).toBeGreaterThan(0);
  const dark = page.getByRole('button', { name: 'Dark' }).first();
  await dark.click();
  expect(await page.evaluate(() => document.documentElement.dataset['theme'])).toBe('dark');
  await context.close();
}, 120_000);

test('a script that somebody got into a page does not run', async () => {
  const { page, context } = await open();
  await page.goto('/sign-in');
  await page.evaluate(() => {
    const script = document.createElement('script');
    script.textContent = 'window.wasRun = true';
    document.body.append(script);
    const image = document.createElement('img');
    image.setAttribute('onerror', 'window.wasRun = true');
    image.src = '/nothing-here.png';
    document.body.append(image);
  });
  await page.waitForTimeout(500);
  expect(await page.evaluate(() => 'wasRun' in window)).toBe(false);
  await context.close();
});

test('pages answer under their own name only, and nobody else may frame them', async () => {
  const answer = await fetch(`${inject('origin')}/sign-in`);
  expect(answer.headers.get('content-type')).toBe('text/html; charset=utf-8');
  expect(answer.headers.get('x-frame-options')).toBe('DENY');
  expect(answer.headers.get('content-security-policy')).toContain("frame-ancestors 'none'");
  expect(answer.headers.get('permissions-policy')).toContain('geolocation=(self)');
  expect(answer.headers.get('referrer-policy')).toBe('same-origin');
  expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
});
