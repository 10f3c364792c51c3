import { typesetRuns } from '#lib/format/descriptors';
import { type FontName } from './fonts';

/** A stretch of text that is set in one font. */
export interface Fragment {
  text: string;
  font: FontName;
  size: number;
  /** Points by which its top lies below the line’s. */
  dropPt: number;
  width: number;
}

export type Measure = (text: string, font: FontName, size: number) => number;

const INDEX_SCALE = 0.75;
/** How far an index stands below the base line, and the font’s ascender, both as parts of a size. */
const INDEX_DROP = 0.17;
const ASCENDER = 1.069;

/** Fragments of a text in which acoustic descriptors are typeset: an italic L and its index below the line. */
export function fragmentsOf(text: string, font: FontName, size: number, measure: Measure): Fragment[] {
  return typesetRuns(text).flatMap((run): Fragment[] => {
    if (typeof run === 'string') return [fragment(run, font, size, 0, measure)];
    const index = size * INDEX_SCALE;
    return [
      fragment(run.symbol, 'italic', size, 0, measure),
      fragment(run.subscript, font, index, ASCENDER * (size - index) + INDEX_DROP * size, measure),
    ];
  });
}

/** Width of fragments beside one another. */
export function widthOf(fragments: readonly Fragment[]): number {
  return fragments.reduce((sum, { width }) => sum + width, 0);
}

/** Lines of at most `width` points; a word that is longer stands alone and is cut where it must. */
export function linesOf(
  text: string,
  font: FontName,
  size: number,
  width: number,
  measure: Measure,
): Fragment[][] {
  const whole = fragmentsOf(text, font, size, measure);
  if (widthOf(whole) <= width) return [whole];
  const lines: Fragment[][] = [[]];
  let used = 0;
  for (const word of text.split(' ').flatMap((part) => cut(part, font, size, width, measure))) {
    const fragments = fragmentsOf(word, font, size, measure);
    const space = measure(' ', font, size);
    const isFirst = used === 0;
    if (!isFirst && used + space + widthOf(fragments) > width) {
      lines.push([]);
      used = 0;
    }
    const line = lines.at(-1) ?? [];
    if (used > 0) line.push({ text: ' ', font, size, dropPt: 0, width: space });
    line.push(...fragments);
    used += (used > 0 ? space : 0) + widthOf(fragments);
  }
  return lines.map((line) => joined(line, measure));
}

function cut(word: string, font: FontName, size: number, width: number, measure: Measure): string[] {
  if (measure(word, font, size) <= width) return [word];
  const parts: string[] = [];
  let part = '';
  for (const character of word) {
    if (part !== '' && measure(part + character, font, size) > width) {
      parts.push(part);
      part = '';
    }
    part += character;
  }
  return [...parts, part];
}

/** Neighbours in the same font become one: a line of plain text is one stretch. */
function joined(line: readonly Fragment[], measure: Measure): Fragment[] {
  const made: Fragment[] = [];
  for (const next of line) {
    const last = made.at(-1);
    const isSame = last?.font === next.font && last.size === next.size && last.dropPt === next.dropPt;
    if (last && isSame)
      made[made.length - 1] = fragment(last.text + next.text, last.font, last.size, last.dropPt, measure);
    else made.push(next);
  }
  return made;
}

function fragment(text: string, font: FontName, size: number, dropPt: number, measure: Measure): Fragment {
  return { text, font, size, dropPt, width: measure(text, font, size) };
}
