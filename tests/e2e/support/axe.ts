import { AxeBuilder } from '@axe-core/playwright';
import { type Page } from 'playwright-core';

const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/**
 * What axe finds wrong with a page by WCAG 2.2 AA, and how much too wide it is; nothing where all is well. Within the page itself: Bittern
 * has no frames, for whose sake axe would open another page each time, which takes longer than looking.
 */
export async function faultsOf(page: Page): Promise<string[]> {
  await untilColoursStand(page);
  const axe = new AxeBuilder({ page }).options({ resultTypes: ['violations'] }).withTags(TAGS);
  const { violations } = await axe.setLegacyMode().analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`);
  const overflowPx = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
  if (page.frames().length > 1) found.push('a frame, which was not looked into');
  return overflowPx > 0 ? [...found, `${overflowPx} px too wide`] : found;
}

/** Waits for colours that are on their way to others, as after a change of theme: half of the way they may be hard to read. */
async function untilColoursStand(page: Page): Promise<void> {
  await page.evaluate(async () => {
    for (let frame = 0; frame < 2; frame += 1) await new Promise(requestAnimationFrame);
    const onTheWay = document.getAnimations().filter((one) => one instanceof CSSTransition);
    await Promise.all(onTheWay.map(({ finished }) => finished.catch(() => undefined)));
  });
}
