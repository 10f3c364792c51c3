import { clockChangesIn } from '#lib/time/clockChange';
import { parseInstant } from '#lib/contracts/common';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { DocumentFormat } from '../format';
import { type RenderContext } from '../render';
import { wordsOf, type MethodFormat, type MonthWords } from '../words/words';
import { SMALL, SOFT_INK } from './fonts';
import { shows, type PdfGround } from './ground';
import { overview, paragraphsOf, signatures } from './overview';
import { Contents } from './contents';
import { Pages, type PageEntry } from './pages';
import { stationPages } from './stationPages';
import { table } from './table';

/** Pages of more stations are not held until all are made: a hundred stations would take more than 500 MB. */
const MOST_BUFFERED = 40;

/** The month as an A4 document to read, print and sign: tagged, with contents and bookmarks, and with what it is on every page. */
export async function renderPdf(doc: MonthDocument, context: RenderContext): Promise<Buffer> {
  if (doc.stations.length <= MOST_BUFFERED) return (await written(doc, context, null)).bytes;
  // Pages that are not held cannot be come back to: a try tells where parts begin.
  const { entries } = await written(doc, context, null);
  return (await written(doc, context, entries)).bytes;
}

/** Writes the document once; `known` tells where its parts begin. */
async function written(
  doc: MonthDocument,
  context: RenderContext,
  known: readonly PageEntry[] | null,
): Promise<{ bytes: Buffer; entries: PageEntry[] }> {
  const words = wordsOf(context.template.language);
  const format = new DocumentFormat(words, doc.timeZone);
  const name = context.template.networkName ?? doc.network.name;
  const title = `${name}, ${words.title(doc.month)}`;
  const state = context.revision === null ? words.draft : words.revision(context.revision);
  const isHeld = doc.stations.length <= MOST_BUFFERED;
  const pages = new Pages({
    title,
    author: context.issuedBy?.name ?? name,
    language: words.tag,
    createdAt: new Date(doc.generatedAt),
    foot: `${title}${doc.isToDate ? `, ${words.toDate}` : ''} · ${state}`,
    pageOf: isHeld ? words.page : null,
    isTrial: !isHeld && known === null,
  });
  const ground: PdfGround = { pages, words, format, doc, context };
  overview(ground);
  const contents = new Contents(pages, words.contents, doc.stations.length + 1, known);
  const first = pages.entries.length;
  for (const station of doc.stations) {
    stationPages(ground, station);
    // Whoever else waits in this process gets a turn between stations.
    await new Promise((resolve) => setImmediate(resolve));
  }
  closing(ground);
  if (isHeld) contents.fill();
  return { bytes: await pages.finish(), entries: pages.entries.slice(first) };
}

/** The method statement’s sentences in a language. */
export function methodSentences(doc: MonthDocument, words: MonthWords): string[] {
  const format = new DocumentFormat(words, doc.timeZone);
  const [change] = clockChangesIn(parseInstant(doc.from) ?? 0, parseInstant(doc.to) ?? 0, doc.timeZone);
  const methodFormat: MethodFormat = {
    instant: (instant) => format.instant(instant),
    coverage: (coverage) => format.coverage(coverage),
    clockChange: change ? { at: format.localDate(change.date), hours: change.hours } : null,
  };
  return words.method(doc, methodFormat);
}

function closing(ground: PdfGround): void {
  const { pages, words, doc, context } = ground;
  pages.section(words.sections.method);
  pages.heading(2, words.sections.method);
  for (const sentence of methodSentences(doc, words)) pages.paragraph(sentence, {}, 5);
  pages.heading(3, words.sections.cautions);
  for (const caution of words.cautions) pages.paragraph(caution);
  for (const paragraph of paragraphsOf(context.template.closing)) pages.paragraph(paragraph);
  signatures(ground);
  seal(ground);
  if (shows(ground, 'glossary')) {
    pages.heading(3, words.sections.glossary);
    table(
      pages,
      [
        { head: words.columns.term, align: 'left' },
        { head: words.columns.meaning, align: 'left', width: 'wide' },
      ],
      words.glossary.map(([term, meaning]) => [term, meaning]),
    );
  }
}

function seal({ pages, words, context }: PdfGround): void {
  const { seal: sealed, chainHead, verifyUrl } = context;
  if (!sealed && !chainHead && !verifyUrl) return;
  const style = { size: SMALL + 0.5, colour: SOFT_INK };
  pages.heading(3, words.sections.seal, { keep: 60 });
  if (sealed) {
    pages.paragraph(`${words.seal.digest}: ${sealed.dataSha256}`, style, 1);
    if (sealed.yearSha256 !== null) pages.paragraph(`${words.seal.year}: ${sealed.yearSha256}`, style, 1);
    pages.paragraph(`${words.seal.software}: ${sealed.softwareVersion}`, style, 1);
    if (sealed.publicKey !== null) pages.paragraph(`${words.seal.key}: ${sealed.publicKey}`, style, 1);
  }
  if (chainHead) {
    pages.paragraph(`${words.seal.chain}: ${chainHead.position}, ${chainHead.sha256}`, style, 1);
  }
  if (verifyUrl) pages.paragraph(`${words.seal.verify} ${verifyUrl}`, style, 1);
}
