import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { linearRgbOf } from '#lib/format/oklch';

const css = readFileSync('src/styles/theme.css', 'utf8');
const OKLCH = /oklch\(([\d.]+) ([\d.]+) ([\d.]+)\)/g;

/** WCAG 2.2 relative luminance of a token in a theme, read from the theme file. */
function luminance(token: string, theme: 'light' | 'dark'): number {
  const value = new RegExp(`--color-${token}: light-dark\\((.+)\\);`).exec(css)?.[1] ?? '';
  const pair = [...value.matchAll(OKLCH)];
  expect(pair, `two colours of ${token}`).toHaveLength(2);
  const [, lightness, chroma, hueDeg] = (pair[theme === 'light' ? 0 : 1] ?? []).map(Number);
  const rgb = linearRgbOf({ lightness: lightness ?? 0, chroma: chroma ?? 0, hueDeg: hueDeg ?? 0 });
  for (const part of rgb) expect(part, `${token} within sRGB`).toBeGreaterThan(-0.002);
  for (const part of rgb) expect(part, `${token} within sRGB`).toBeLessThan(1.002);
  const [red, green, blue] = rgb.map((part) => Math.min(1, Math.max(0, part))) as [number, number, number];
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(one: string, other: string, theme: 'light' | 'dark'): number {
  const [a, b] = [luminance(one, theme), luminance(other, theme)];
  return (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
}

const GROUNDS = ['paper', 'sunk', 'raised'];
const TEXT = ['ink', 'ink-soft', 'reed', 'rust', 'ochre-text', 'estuary'];
const ON_WASH = ['reed', 'rust', 'ochre', 'estuary'].map((name) => `${name}-wash`);

describe.each(['light', 'dark'] as const)('the %s theme', (theme) => {
  it.each(TEXT.flatMap((text) => GROUNDS.map((ground) => [text, ground] as const)))(
    'writes %s on %s at 4.5:1',
    (text, ground) => expect(contrast(text, ground, theme)).toBeGreaterThanOrEqual(4.5),
  );

  it.each(
    ON_WASH.flatMap((wash) => ['ink', 'ink-soft', 'rust', 'ochre-text'].map((text) => [text, wash] as const)),
  )('writes %s on %s at 4.5:1', (text, wash) =>
    expect(contrast(text, wash, theme)).toBeGreaterThanOrEqual(4.5),
  );

  it.each([
    ['on-reed', 'reed'],
    ['on-reed', 'reed-deep'],
  ])('writes %s on %s at 4.5:1', (text, ground) =>
    expect(contrast(text, ground, theme)).toBeGreaterThanOrEqual(4.5),
  );

  it.each(['ochre', 'edge'].flatMap((mark) => GROUNDS.map((ground) => [mark, ground] as const)))(
    'draws the mark %s on %s at 3:1',
    (mark, ground) => expect(contrast(mark, ground, theme)).toBeGreaterThanOrEqual(3),
  );
});
