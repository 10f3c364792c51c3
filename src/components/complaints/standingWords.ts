import type { Standing } from '#lib/contracts/evidencePack';

/** Whether a station speaks for the place, in a word or two. */
export const VERDICT_WORDS: Readonly<Record<Standing['verdict'], string>> = {
  near: 'Speaks for the place',
  area: 'Speaks for the area',
  far: 'Does not speak for the place',
  'no-data': 'Has nothing to say',
  'unknown-place': 'Cannot be said',
};

/** "350 m", "1.2 km". */
export function metresText(metres: number): string {
  return metres < 1000 ? `${metres} m` : `${(metres / 1000).toFixed(1)} km`;
}
