import { once } from 'node:events';
import PDFDocument from 'pdfkit';
import { BODY, FONT_FILES, INK, RULE, SMALL, SOFT_INK, type FontName } from './fonts';
import { fragmentsOf, linesOf, widthOf, type Fragment } from './runs';

/** A4 in points, and where its text stands. */
export const PAGE = { width: 595.28, height: 841.89 };
export const LEFT = 54;
export const RIGHT = PAGE.width - 54;
export const WIDTH = RIGHT - LEFT;
const TOP = 54;
const BOTTOM = PAGE.height - 62;
const LINE = 1.32;

export interface TextStyle {
  font?: FontName;
  size?: number;
  colour?: string;
  align?: 'left' | 'right';
}

export interface PdfMeta {
  title: string;
  author: string;
  language: string;
  createdAt: Date;
  /** Left side of every page’s foot. */
  foot: string;
  /** Null: pages are numbered without telling how many there are, so that each can leave memory when it is full. */
  pageOf: ((page: number, pages: number) => string) | null;
  /** Only to learn on which pages parts begin: nothing of the document is kept. */
  isTrial: boolean;
}

/** A part of the document and the page that it begins on. */
export interface PageEntry {
  title: string;
  page: number;
}

type Structure = PDFKit.PDFStructureElement;
type Outline = PDFKit.PDFOutline;

/**
 * Pages of a tagged A4 document that fill from top to bottom. Everything that is read is an element of the structure; rules,
 * repeated heads and feet are artifacts.
 */
export class Pages {
  readonly doc: PDFKit.PDFDocument;
  /** Where the next thing goes, points from the top. */
  y = TOP;
  readonly #meta: PdfMeta;
  readonly #chunks: Buffer[] = [];
  readonly #ended: Promise<unknown>;
  readonly #root: Structure;
  readonly #entries: PageEntry[] = [];
  readonly #widths = new Map<string, number>();
  #page = 1;
  #section: Structure;
  #open: Structure | null = null;
  #outline: Outline | null = null;

  constructor(meta: PdfMeta) {
    this.#meta = meta;
    this.doc = new PDFDocument({
      size: 'A4',
      margin: 0,
      bufferPages: meta.pageOf !== null,
      pdfVersion: '1.7',
      tagged: true,
      lang: meta.language,
      displayTitle: true,
      font: FONT_FILES.regular,
      info: { Title: meta.title, Author: meta.author, Creator: 'Bittern', CreationDate: meta.createdAt },
    });
    this.doc.on('data', (chunk: Buffer) => {
      if (!meta.isTrial) this.#chunks.push(chunk);
    });
    this.#ended = once(this.doc, 'end');
    this.#root = this.doc.struct('Document');
    this.doc.addStructure(this.#root);
    this.#section = this.doc.struct('Sect');
    this.#root.add(this.#section);
  }

  /** Width of a text in points; asked for again and again, so it is remembered. */
  readonly measure = (text: string, font: FontName, size: number): number => {
    const key = `${font} ${size} ${text}`;
    const known = this.#widths.get(key);
    if (known !== undefined) return known;
    const width = this.doc.font(FONT_FILES[font]).fontSize(size).widthOfString(text);
    this.#widths.set(key, width);
    return width;
  };

  /** Begins a part of the document, on a new page where something stands on this one. */
  section(title: string, { newPage = true } = {}): void {
    if (newPage && this.y > TOP) this.newPage();
    if (this.#section !== this.#open) this.#section.end();
    this.#section = this.doc.struct('Sect', { title });
    this.#root.add(this.#section);
    this.#outline = this.doc.outline.addItem(title);
    this.#entries.push({ title, page: this.#page });
  }

  /** The present part may be added to until the document ends. */
  leaveOpen(): void {
    this.#open = this.#section;
  }

  /** Where each part so far begins. */
  get entries(): readonly PageEntry[] {
    return this.#entries;
  }

  /** The page that is being filled. */
  get page(): number {
    return this.#page;
  }

  /** Draws on a page that was filled before, where pages are held, and comes back. */
  onPage(page: number, draw: () => void): void {
    const y = this.y;
    this.doc.switchToPage(page - 1);
    this.y = TOP;
    draw();
    this.doc.switchToPage(this.#page - 1);
    this.y = y;
  }

  newPage(): void {
    if (this.#meta.pageOf === null) this.#foot(String(this.#page));
    this.#page += 1;
    this.doc.addPage();
    this.y = TOP;
  }

  /** Turns the page unless so many points are left on it. */
  ensure(height: number): void {
    if (this.y + height > BOTTOM) this.newPage();
  }

  /** What is left of the page, points. */
  get left(): number {
    return BOTTOM - this.y;
  }

  /** A heading, which stays with what follows it and appears among the bookmarks. */
  heading(level: 1 | 2 | 3, text: string, { keep = 60 } = {}): void {
    const size = { 1: 20, 2: 15, 3: 11.5 }[level];
    const before = this.y === TOP ? 0 : { 1: 0, 2: 4, 3: 13 }[level];
    this.ensure(before + size * LINE + keep);
    this.y += before;
    if (level === 3) (this.#outline ?? this.doc.outline).addItem(text);
    this.#text(`H${level}`, text, { font: 'bold', size });
    this.y += level === 3 ? 3 : 5;
  }

  /** A heading of the part that was left open, which has a bookmark already. */
  title(text: string): void {
    this.#text('H2', text, { font: 'bold', size: 15 }, this.#open);
    this.y += 5;
  }

  /** A paragraph over the width of the page. */
  paragraph(text: string, style: TextStyle = {}, after = 4): void {
    this.#text('P', text, style);
    this.y += after;
  }

  /** Lines side by side: a label and its text. */
  labelled(label: string, text: string): void {
    this.paragraph(`${label}: ${text}`, { colour: SOFT_INK }, 1.5);
  }

  /** Adds an element to the present part; `draw` is run at once. */
  add(type: string, draw: () => void, options: PDFKit.Mixins.StructureElementOptions = {}): void {
    this.#section.add(this.doc.struct(type, options, draw));
  }

  /** Opens an element that has elements of its own; whoever opens it ends it. */
  open(type: string, parent: Structure | null = null): Structure {
    const element = this.doc.struct(type);
    (parent ?? this.#section).add(element);
    return element;
  }

  /** Draws what nobody needs to be told of. */
  artifact(draw: () => void, type: 'Layout' | 'Pagination' = 'Layout'): void {
    this.doc.markContent('Artifact', { type });
    draw();
    this.doc.endMarkedContent();
  }

  /** A thin line across some width. */
  rule(y: number, x1 = LEFT, x2 = RIGHT, colour = RULE): void {
    this.artifact(() => this.doc.moveTo(x1, y).lineTo(x2, y).lineWidth(0.6).strokeColor(colour).stroke());
  }

  /** Sets fragments on a line that begins at `x`. */
  fragments(fragments: readonly Fragment[], x: number, y: number, colour = INK): void {
    let at = x;
    for (const { text, font, size, dropPt, width } of fragments) {
      this.doc.font(FONT_FILES[font]).fontSize(size).fillColor(colour);
      this.doc.text(text, at, y + dropPt, { lineBreak: false });
      at += width;
    }
  }

  /** A short text at a place, for charts and tables. */
  put(
    text: string,
    x: number,
    y: number,
    { font = 'regular', size = BODY, colour = INK, align = 'left' }: TextStyle = {},
  ): void {
    const fragments = fragmentsOf(text, font, size, this.measure);
    this.fragments(fragments, align === 'right' ? x - widthOf(fragments) : x, y, colour);
  }

  /** Writes the feet and ends the document. */
  async finish(): Promise<Buffer> {
    this.#section.end();
    this.#root.end();
    const { pageOf } = this.#meta;
    if (pageOf === null) this.#foot(String(this.#page));
    else {
      for (let at = 0; at < this.#page; at += 1) {
        this.doc.switchToPage(at);
        this.#foot(pageOf(at + 1, this.#page));
      }
    }
    this.doc.end();
    await this.#ended;
    return Buffer.concat(this.#chunks);
  }

  #foot(number: string): void {
    const style = { size: SMALL, colour: SOFT_INK };
    this.artifact(() => {
      this.put(this.#meta.foot, LEFT, PAGE.height - 44, style);
      this.put(number, RIGHT, PAGE.height - 44, { ...style, align: 'right' });
    }, 'Pagination');
  }

  #text(
    type: string,
    text: string,
    { font = 'regular', size = BODY, colour = INK }: TextStyle,
    parent: Structure | null = null,
  ): void {
    const lines = linesOf(text, font, size, WIDTH, this.measure);
    const height = size * LINE;
    // A paragraph that does not fit goes on over the page, line by line.
    const element = this.open(type, parent);
    for (const line of lines) {
      this.ensure(height);
      element.add(() => this.fragments(line, LEFT, this.y, colour));
      this.y += height;
    }
    element.end();
  }
}
