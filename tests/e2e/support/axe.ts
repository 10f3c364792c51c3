import { AxeBuilder } from '@axe-core/playwright';
import { type Page } from 'playwright-core';

const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/**
 * What axe finds wrong with a page by WCAG 2.2 AA, and how much too wide it is; nothing where all is well. Within the page itself: Bittern
 * has no frames, for whose sake axe would open another page each time, which takes longer than looking.
 */
export async function faultsOf(page: Page): Promise<string[]> {
  await untilItStands(page);
  const axe = new AxeBuilder({ page }).options({ resultTypes: ['violations'] }).withTags(TAGS);
  const { violations } = await axe.setLegacyMode().analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`);
  if (page.frames().length > 1) found.push('a frame, which was not looked into');
  return [...found, ...(await page.evaluate(tooWide))];
}

/** How much too wide the page is, and the innermost elements that reach beyond it. */
function tooWide(): string[] {
  const overflowPx = document.documentElement.scrollWidth - innerWidth;
  if (overflowPx <= 0) return [];
  const beyond = [...document.querySelectorAll('body *')].filter(
    (one) => one.getBoundingClientRect().right > innerWidth && one.childElementCount === 0,
  );
  return [
    `${overflowPx} px too wide: ${beyond
      .slice(0, 3)
      .map((one) => one.outerHTML.slice(0, 200))
      .join(' ')}`,
  ];
}

/** Waits for the page's own letters, and for colours that are on their way to others, as after a change of theme: half of the way they may be hard to read. */
async function untilItStands(page: Page): Promise<void> {
  await page.evaluate(async () => {
    await document.fonts.ready;
    for (let frame = 0; frame < 2; frame += 1) await new Promise(requestAnimationFrame);
    const onTheWay = document.getAnimations().filter((one) => one instanceof CSSTransition);
    await Promise.all(onTheWay.map(({ finished }) => finished.catch(() => undefined)));
  });
}
