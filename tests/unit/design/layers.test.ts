import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';

/**
 * The first sheet that a page loads orders the cascade layers. One that names a layer outside the theme may come before it and
 * turn the order round, so that the base styles win over the controls.
 */
test('only the theme’s own sheets name cascade layers', () => {
  const sheets = readdirSync('src', { recursive: true, encoding: 'utf8' })
    .filter((file) => /\.(css|astro)$/.test(file) && !file.startsWith('styles/'))
    .filter((file) => /@layer\s/.test(readFileSync(join('src', file), 'utf8')));
  expect(sheets).toEqual([]);
});
