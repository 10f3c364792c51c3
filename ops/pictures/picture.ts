import { join } from 'node:path';
import { type Browser } from 'playwright-core';
import { type Session } from './session';

/** How a page is looked at. */
export interface View {
  theme: 'light' | 'dark';
  widthPx: number;
}

export const VIEWS: readonly View[] = [
  { theme: 'light', widthPx: 1280 },
  { theme: 'dark', widthPx: 1280 },
  { theme: 'light', widthPx: 390 },
  { theme: 'dark', widthPx: 390 },
];

export interface Picture extends View {
  /** Empty: there is none, the faults say why. */
  file: string;
  /** What is wrong: a status, what scripts complained of, how much too wide it is. */
  faults: string[];
}

const SETTLED_MS = 2000;
/** Longer than a picture takes on a machine that has other work. */
const MOST_WAIT_MS = 120_000;
/** Pages are cut off below that: lists may be long. */
const MOST_HEIGHT_PX = 4000;

/** Takes a picture of a page, whole, into a folder. */
export async function takePicture(
  browser: Browser,
  session: Session,
  path: string,
  view: View,
  folder: string,
): Promise<Picture> {
  const { theme, widthPx } = view;
  const context = await browser.newContext({
    baseURL: session.origin,
    viewport: { width: widthPx, height: 860 },
    colorScheme: theme,
  });
  const faults: string[] = [];
  try {
    await context.addCookies(cookiesOf(session));
    const page = await context.newPage();
    page.setDefaultTimeout(MOST_WAIT_MS);
    page.on('console', (message) => {
      if (message.type() === 'error') faults.push(`console: ${message.text()}`);
    });
    page.on('pageerror', (error) => faults.push(`script: ${error.message}`));
    const answer = await page.goto(path, { waitUntil: 'load' });
    if (answer?.status() !== 200) faults.push(`status ${answer?.status() ?? 'unknown'}`);
    await page.waitForTimeout(SETTLED_MS);
    const [tooWidePx, heightPx] = await page.evaluate(() => [
      document.documentElement.scrollWidth - innerWidth,
      document.documentElement.scrollHeight,
    ]);
    if ((tooWidePx ?? 0) > 0) faults.push(`${tooWidePx} px too wide`);
    const file = `${fileName(path)}-${theme}-${widthPx}.png`;
    const height = Math.min(heightPx ?? 0, MOST_HEIGHT_PX);
    await page.screenshot({
      path: join(folder, file),
      fullPage: true,
      animations: 'disabled',
      timeout: MOST_WAIT_MS,
      clip: { x: 0, y: 0, width: widthPx, height },
    });
    return { ...view, file, faults };
  } catch (error) {
    // One page that cannot be shown takes no other's picture away.
    faults.push(`no picture: ${error instanceof Error ? error.message : String(error)}`);
    return { ...view, file: '', faults };
  } finally {
    await context.close();
  }
}

function cookiesOf({ cookie, origin }: Session) {
  return cookie
    .split('; ')
    .filter((pair) => pair !== '')
    .map((pair) => {
      const at = pair.indexOf('=');
      return { name: pair.slice(0, at), value: pair.slice(at + 1), url: origin };
    });
}

function fileName(path: string): string {
  return path.replace(/^\//, '').replace(/[^\w.-]+/g, '_') || 'start';
}
