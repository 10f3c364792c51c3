import { typesetRuns } from '#lib/format/descriptors';
import type { Content, ContentText, CustomTableLayout, TableCell } from 'pdfmake/interfaces';

export const INK = '#223029';
export const SOFT_INK = '#5c675f';
export const RULE = '#b9beb5';
export const RUST = '#9c3d1f';

/** pdfmake sets a subscript at 0.58 of its size, which is too small to read in print at 9 pt. */
const INDEX_SCALE = 1.25;
const BODY_SIZE = 9;
export const SMALL_SIZE = 8;

/** Text in which acoustic descriptors are typeset: an italic L and its index below the line. `size` in points. */
export function typeset(text: string, size = BODY_SIZE): ContentText {
  const runs = typesetRuns(text);
  // A cell of plain text stays one node: a month has thousands, and each node costs layout time.
  if (runs.every((run) => typeof run === 'string')) return { text, fontSize: size };
  const parts = runs.flatMap((run): Content[] =>
    typeof run === 'string'
      ? [run]
      : [
          { text: run.symbol, italics: true },
          { text: run.subscript, sub: true, fontSize: size * INDEX_SCALE },
        ],
  );
  return { text: parts, fontSize: size };
}

export function heading(text: string): Content {
  return { text, bold: true, fontSize: 12, margin: [0, 14, 0, 4], headlineLevel: 1 };
}

export function paragraph(text: string): Content {
  return { ...typeset(text), margin: [0, 0, 0, 5], lineHeight: 1.2 };
}

/** A heading cell; numbers stand right. */
export function head(text: string, alignment: 'left' | 'right' = 'right'): TableCell {
  return { ...typeset(text, SMALL_SIZE), alignment, color: SOFT_INK };
}

export function cell(text: string, alignment: 'left' | 'right' = 'right', size = BODY_SIZE): TableCell {
  return { ...typeset(text, size), alignment };
}

/** A table as in a book: rules above, below the heading and at the foot, none between the rows. */
export const BOOK_TABLE: CustomTableLayout = {
  hLineWidth: (line, node) => (line === 0 || line === 1 || line === node.table.body.length ? 0.6 : 0),
  vLineWidth: () => 0,
  hLineColor: () => RULE,
  paddingLeft: (column) => (column === 0 ? 0 : 5),
  paddingRight: (column, node) => (column === (node.table.widths?.length ?? 0) - 1 ? 0 : 5),
  paddingTop: () => 1.6,
  paddingBottom: () => 1.6,
};
