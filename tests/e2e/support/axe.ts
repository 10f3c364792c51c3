import { AxeBuilder } from '@axe-core/playwright';
import { type Page } from 'playwright-core';

const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** What axe finds wrong with a page by WCAG 2.2 AA, and how much too wide it is; nothing where all is well. */
export async function faultsOf(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).withTags(TAGS).analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`);
  const overflowPx = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
  return overflowPx > 0 ? [...found, `${overflowPx} px too wide`] : found;
}
