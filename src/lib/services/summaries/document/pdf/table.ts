import { BODY, INK, RULE, SMALL, SOFT_INK } from './fonts';
import { LEFT, WIDTH, type Pages } from './pages';
import { fragmentsOf, linesOf, widthOf, type Fragment } from './runs';

export interface TableColumn {
  head: string;
  /** `wide` columns share what the others leave, and wrap. */
  width?: 'natural' | 'wide' | number;
  align?: 'left' | 'right';
}

export interface TableCell {
  text: string;
  colour?: string;
  bold?: boolean;
}

export interface TableOptions {
  /** Points. */
  size?: number;
  left?: number;
  width?: number;
  /** Columns whose cells head their row. */
  rowHeads?: number;
}

type Cell = string | TableCell;

interface Placed extends Required<Pick<TableColumn, 'align'>> {
  head: string;
  x: number;
  width: number;
}

const GAP = 9;
const ROW_PADDING = 2.2;
const LINE = 1.25;
/** Widest heading that is kept on one line, points. */
const MOST_HEAD = 52;

/** A table as in a book: rules above, below the heading and at the foot. Its head is repeated on every page. */
export function table(
  pages: Pages,
  columns: readonly TableColumn[],
  rows: readonly (readonly Cell[])[],
  { size = BODY - 0.5, left = LEFT, width = WIDTH, rowHeads = 1 }: TableOptions = {},
): void {
  const placed = place(pages, columns, rows, { size, left, width });
  const end = left + width;
  const element = pages.open('Table');
  let first = true;
  const head = () => {
    pages.rule(pages.y, left, end);
    pages.y += ROW_PADDING;
    const cells = placed.map((column) => linesOf(column.head, 'regular', SMALL, column.width, pages.measure));
    const drawCell = (at: number) =>
      drawLines(pages, cells[at] ?? [], placed[at], { size: SMALL, colour: SOFT_INK });
    if (first) {
      const row = pages.open('TR', element);
      placed.forEach((_, at) =>
        row.add(
          pages.doc.struct('TH', { scope: 'Column' } as PDFKit.Mixins.StructureElementOptions, () =>
            drawCell(at),
          ),
        ),
      );
      row.end();
    } else {
      pages.artifact(() => placed.forEach((_, at) => drawCell(at)));
    }
    first = false;
    pages.y += Math.max(...cells.map((lines) => lines.length)) * SMALL * LINE + ROW_PADDING;
    pages.rule(pages.y, left, end);
    pages.y += 1;
  };
  const headHeight = SMALL * LINE * 2 + 2 * ROW_PADDING + 3;
  pages.ensure(headHeight + 3 * size * LINE);
  head();
  for (const cells of rows) {
    const lines = placed.map((column, at) => {
      const { text, bold } = cellOf(cells[at]);
      return linesOf(text, bold ? 'bold' : 'regular', size, column.width, pages.measure);
    });
    const height = Math.max(1, ...lines.map((of) => of.length)) * size * LINE + 1.4;
    if (pages.left < height + 2) {
      pages.rule(pages.y, left, end);
      pages.newPage();
      head();
    }
    const row = pages.open('TR', element);
    placed.forEach((column, at) => {
      const type = at < rowHeads ? 'TH' : 'TD';
      const options = (at < rowHeads ? { scope: 'Row' } : {}) as PDFKit.Mixins.StructureElementOptions;
      const { colour = INK } = cellOf(cells[at]);
      row.add(
        pages.doc.struct(type, options, () => drawLines(pages, lines[at] ?? [], column, { size, colour })),
      );
    });
    row.end();
    pages.y += height;
  }
  element.end();
  pages.rule(pages.y + 1, left, end, RULE);
  pages.y += 7;
}

function cellOf(cell: Cell | undefined): TableCell {
  return typeof cell === 'string' || cell === undefined ? { text: cell ?? '' } : cell;
}

function drawLines(
  pages: Pages,
  lines: readonly (readonly Fragment[])[],
  column: Placed | undefined,
  { size, colour }: { size: number; colour: string },
): void {
  if (!column) return;
  lines.forEach((line, at) => {
    const x = column.align === 'right' ? column.x + column.width - widthOf(line) : column.x;
    pages.fragments(line, x, pages.y + at * size * LINE, colour);
  });
}

/** Natural widths first; what is left goes to the wide columns, or is shared as room between all. */
function place(
  { measure }: Pages,
  columns: readonly TableColumn[],
  rows: readonly (readonly Cell[])[],
  { size, left, width }: { size: number; left: number; width: number },
): Placed[] {
  const natural = columns.map(({ head, width: wanted }, at) => {
    if (typeof wanted === 'number') return wanted;
    const widest = rows.reduce((most, cells) => {
      const { text, bold } = cellOf(cells[at]);
      return Math.max(most, widthOf(fragmentsOf(text, bold ? 'bold' : 'regular', size, measure)));
    }, 0);
    const whole = widthOf(fragmentsOf(head, 'regular', SMALL, measure));
    const words = head.split(' ').map((word) => widthOf(fragmentsOf(word, 'regular', SMALL, measure)));
    // A short heading stands on one line; a long one may break between words.
    const own = whole <= MOST_HEAD ? whole : Math.max(...words);
    return Math.max(widest, own) + 0.5;
  });
  const gaps = GAP * (columns.length - 1);
  const isWide = (at: number) => columns[at]?.width === 'wide';
  const fixed = natural.reduce((sum, one, at) => sum + (isWide(at) ? 0 : one), 0);
  const wideCount = columns.filter((_, at) => isWide(at)).length;
  const rest = width - gaps - fixed;
  const room = wideCount === 0 ? Math.max(0, rest / Math.max(1, columns.length - 1)) : 0;
  const wideTotal = natural.reduce((sum, one, at) => sum + (isWide(at) ? one : 0), 0);
  let x = left;
  return columns.map(({ head, align = 'right' }, at) => {
    const own = natural[at] ?? 0;
    // Wide columns share by what they would like, so that a short one does not take from a long one.
    const of = isWide(at) ? Math.max(40, (rest * own) / Math.max(1, wideTotal)) : own;
    const column = { head, align, x, width: of };
    x += of + GAP + room;
    return column;
  });
}
