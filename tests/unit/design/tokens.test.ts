import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { colourTokens, sizeTokens } from '#components/design/tokens.ts';

const themeText = readFileSync('src/styles/theme.css', 'utf8');

test('the design page shows every colour and every size of the theme', () => {
  const colours = colourTokens(themeText);
  expect(colours.map(({ name }) => name)).toEqual(
    expect.arrayContaining(['paper', 'ink', 'reed', 'rust', 'ochre', 'estuary', 'on-reed']),
  );
  expect(colours.every(({ light, dark }) => light.startsWith('oklch(') && light !== dark)).toBe(true);
  expect(sizeTokens(themeText)).toContainEqual({ name: 'body', size: '0.9375rem' });
  expect(sizeTokens(themeText).some(({ name }) => name.includes('line'))).toBe(false);
});
