import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';

const root = dirname(createRequire(import.meta.url).resolve('@expo-google-fonts/noto-sans/package.json'));
const file = (weight: string) => join(root, weight, `NotoSans_${weight}.ttf`);

/** Files of Noto Sans by the name that they have in a document; they are embedded, cut to what is used. */
export const FONT_FILES = {
  regular: file('400Regular'),
  bold: file('700Bold'),
  italic: file('400Regular_Italic'),
} as const;
export type FontName = keyof typeof FONT_FILES;

export const INK = '#223029';
export const SOFT_INK = '#5c675f';
export const RULE = '#b9beb5';
export const RUST = '#9c3d1f';
export const GREEN = '#2f6a45';
export const BLUE = '#2d5f8a';
export const PALE = '#8fa593';

export const BODY = 9;
export const SMALL = 7.5;
