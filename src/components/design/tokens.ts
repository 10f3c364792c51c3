export interface ColourToken {
  /** "rust-wash". */
  name: string;
  light: string;
  dark: string;
}

export interface SizeToken {
  /** "lead". */
  name: string;
  size: string;
}

const COLOUR = /--color-([\w-]+): light-dark\((oklch\([^)]+\)), (oklch\([^)]+\))\);/g;
const SIZE = /--text-([a-z]+): ([\d.]+rem);/g;

/** A theme's colours as its file has them, so that the page that shows them cannot lag behind. */
export function colourTokens(themeText: string): ColourToken[] {
  return [...themeText.matchAll(COLOUR)].map(([, name = '', light = '', dark = '']) => ({
    name,
    light,
    dark,
  }));
}

/** A theme's sizes of type, in its file's order. */
export function sizeTokens(themeText: string): SizeToken[] {
  return [...themeText.matchAll(SIZE)].map(([, name = '', size = '']) => ({ name, size }));
}
