import { mkdirSync } from 'node:fs';
import { type Browser, type BrowserContext, type Page } from 'playwright-core';
import { afterAll, beforeAll, inject } from 'vitest';
import { launchChromium } from '#ops/chromium';

export interface Visit {
  width?: number;
  height?: number;
  theme?: 'light' | 'dark';
}

/** One browser for the test file. */
export function useBrowser() {
  let browser: Browser | undefined;

  beforeAll(async () => {
    browser = await launchChromium();
  });

  afterAll(async () => browser?.close());

  /** A fresh browser profile at Bittern's address. */
  async function open({ width = 1280, height = 860, theme = 'light' }: Visit = {}): Promise<{
    context: BrowserContext;
    page: Page;
  }> {
    if (!browser) throw new Error('The browser has not started.');
    const context = await browser.newContext({
      baseURL: inject('origin'),
      viewport: { width, height },
      colorScheme: theme,
      acceptDownloads: true,
    });
    return { context, page: await context.newPage() };
  }

  return { open };
}

/** Signs a demo account in through the form. */
export async function signIn(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(inject('demoPassword'));
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

/** Keeps a picture of the page in the tests' output folder, to be looked at. */
export async function picture(page: Page, name: string): Promise<void> {
  mkdirSync('tests/.output/pictures', { recursive: true });
  await page.screenshot({ path: `tests/.output/pictures/${name}.png`, fullPage: true });
}
