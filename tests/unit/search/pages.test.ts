import { existsSync } from 'node:fs';
import { expect, test } from 'vitest';
import { FINDABLE_PAGES } from '#lib/services/search/pages';

test.each(FINDABLE_PAGES.map(({ label, path }) => [label, path]))('%s leads to a page', (_, path) => {
  const file = `src/pages${path.startsWith('/') ? path : `/n/[network]/${path}`}`;
  expect([`${file}.astro`, `${file}/index.astro`].some((name) => existsSync(name))).toBe(true);
});
