import { SOFT_INK } from './fonts';
import { LEFT, RIGHT, type PageEntry, type Pages } from './pages';

const ROW = 14;
const SIZE = 9.5;
const ROWS_A_PAGE = 46;
const DOTS_GAP = 4;

/** The contents of a document: pages of their own, before it is known where anything begins. */
export class Contents {
  readonly #pages: Pages;
  readonly #title: string;
  readonly #list: PDFKit.PDFStructureElement;
  readonly #firstPage: number;

  /** Keeps pages free for so many parts; `known` are written at once, where an earlier try has told them. */
  constructor(pages: Pages, title: string, parts: number, known: readonly PageEntry[] | null) {
    this.#pages = pages;
    this.#title = title;
    pages.section(title);
    pages.leaveOpen();
    this.#firstPage = pages.page;
    this.#list = pages.open('TOC');
    const count = Math.max(1, Math.ceil(parts / ROWS_A_PAGE));
    for (let at = 0; at < count; at += 1) {
      if (at > 0) pages.newPage();
      if (known) this.#page(at, known);
    }
    pages.newPage();
  }

  /** Writes what comes after the contents onto the pages that were kept, which must be at hand still. */
  fill(): void {
    const entries = this.#pages.entries.filter(({ page }) => page > this.#firstPage);
    for (let at = 0; at * ROWS_A_PAGE < entries.length; at += 1) {
      this.#pages.onPage(this.#firstPage + at, () => this.#page(at, entries));
    }
  }

  #page(at: number, entries: readonly PageEntry[]): void {
    const pages = this.#pages;
    if (at === 0) pages.title(this.#title);
    for (const { title, page } of entries.slice(at * ROWS_A_PAGE, (at + 1) * ROWS_A_PAGE)) {
      const number = String(page);
      const y = pages.y;
      const item = pages.open('TOCI', this.#list);
      item.add(() => {
        pages.put(title, LEFT, y, { size: SIZE });
        pages.put(number, RIGHT, y, { size: SIZE, align: 'right' });
      });
      item.end();
      const from = LEFT + pages.measure(title, 'regular', SIZE) + DOTS_GAP;
      const to = RIGHT - pages.measure(number, 'regular', SIZE) - DOTS_GAP;
      pages.artifact(() => dots(pages, from, to, y + SIZE));
      pages.y += ROW;
    }
  }
}

function dots({ doc }: Pages, from: number, to: number, y: number): void {
  if (from >= to) return;
  doc.moveTo(from, y).lineTo(to, y).lineWidth(0.5).dash(0.5, { space: 3 });
  doc.strokeColor(SOFT_INK).stroke().undash();
}
