import { type Page } from 'playwright-core';

/** While one page draws or settles, others are loaded; more than three only wait for each other on two processors. */
const TAB_COUNT = 3;

/** Does `work` for each item, in the page's tab and others beside it. */
export async function inTabs<T>(
  page: Page,
  items: readonly T[],
  work: (tab: Page, item: T) => Promise<void>,
): Promise<void> {
  const waiting = [...items];
  const walk = async (tab: Page) => {
    for (let item = waiting.shift(); item !== undefined; item = waiting.shift()) await work(tab, item);
  };
  const others = Array.from({ length: TAB_COUNT - 1 }, () => page.context().newPage());
  await Promise.all([page, ...(await Promise.all(others))].map(walk));
}
